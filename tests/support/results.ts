import type { HeatCapacityAnalysis, Verdict } from '#shared/heat-capacity/types'
import type { DatasetMapping } from '#shared/types/results'
import type { Database } from '#server/db/client'
import { analyses, datasets } from '#server/db/schema'

const mapping: DatasetMapping = {
  columns: { temperature: { column: 0, unit: 'K' }, heatCapacity: { column: 1, unit: 'mJ/(mol K)' } },
  sample: { formula: 'Cu', molarMassGPerMol: 63.546, atomsPerFormulaUnit: 1, kind: 'metal' }, heads: ['T/K', 'C/(mJ/(mol K))'], conversionUses: [],
}

let serial = 0

/** A mapped dataset with two points, without a file behind it. */
export async function insertTestDataset(db: Database, run: { id: string }, personId: string, more: Partial<typeof datasets.$inferInsert> = {}) {
  serial += 1
  const [dataset] = await db.insert(datasets).values({
    runId: run.id, originalName: `sweep-${serial}.csv`, fileKey: serial.toString(16).padStart(32, '0'), bytes: 40, sha256: serial.toString(16).padStart(64, '0'), uploadedBy: personId,
    mapping, rowCount: 2, temperatureK: [2, 3], heatCapacity: [1.77, 3.37], sigma: [0.02, 0.03], ...more,
  }).returning()
  return dataset!
}

/** An analysis row of a given verdict; its numbers are copper's, its checks one of each status that the verdict needs. */
export async function insertTestAnalysis(db: Database, dataset: { id: string }, personId: string, verdict: Verdict, createdAt = new Date('2027-01-09T08:00Z')) {
  const gamma = { value: 0.693, standardError: 0.006, unit: 'mJ/(mol K²)' }
  const check = (status: Verdict) => ({ id: 'scale' as const, status, title: 'Scale', message: 'A sentence.', source: 'test', why: 'Two lines.' })
  const result: HeatCapacityAnalysis = {
    engineVersion: '1.0.0', verdict, suggestions: [], checks: verdict === 'ok' ? [check('ok')] : [check('ok'), check(verdict)],
    fit: {
      model: { terms: ['gamma', 'beta3'], windowK: [2, 3] }, weights: 'stated-sigma', errorConvention: 'absolute', coefficients: { gamma }, covariance: [], pointCount: 2, degreesOfFreedom: 0,
      debyeTemperature: { value: 344, standardError: 2, unit: 'K' }, chiSquared: 0, reducedChiSquared: 0, conditionNumber: 1, residuals: [0, 0], usedIndices: [0, 1],
    },
  }
  const lineage = { datasetId: dataset.id, originalName: 'sweep.csv', fileSha256: '0', mapping, curveSha256: 'another', addenda: null, correction: null, windowK: [2, 3] as const, engineVersion: '1.0.0' }
  const [analysis] = await db.insert(analyses).values({
    datasetId: dataset.id, createdBy: personId, createdAt, verdict, engineVersion: '1.0.0', result: { ...result, lineage },
    sample: { formula: 'Cu', molarMassGPerMol: 63.546, atomsPerFormulaUnit: 1, kind: 'metal' },
  }).returning()
  return analysis!
}
