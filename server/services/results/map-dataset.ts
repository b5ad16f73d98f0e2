import { and, eq } from 'drizzle-orm'
import type { Actor } from '#shared/access/rules'
import { DomainError } from '#shared/errors'
import { requireTotalUnit, WHOLE_HOLDER } from '#shared/heat-capacity/addenda-amount'
import { applyMapping } from '#shared/heat-capacity/apply-mapping'
import { readTable } from '#shared/heat-capacity/read-table'
import { parseFormula } from '#shared/heat-capacity/sample'
import type { HeatCapacitySample } from '#shared/heat-capacity/types'
import type { AnalysisSampleInput } from '#shared/schemas/heat-capacity'
import type { MapDatasetInput } from '#shared/schemas/results'
import type { MappingReply } from '#shared/types/results'
import type { FileStore } from '#server/adapters/storage/files'
import type { Database } from '#server/db/client'
import { datasets, runSamples } from '#server/db/schema'
import { writeAudit } from '#server/services/audit/write-audit'
import { packRows } from './packed-rows'
import { readRawFile } from './raw-file'
import { datasetFor } from './run-of'

/**
 * Confirms the columns of an uploaded table: the file is read anew, converted to mJ/(mol K), and the curve is kept. Rows
 * that cannot stand in it are listed with the reason; `restoredRows` puts some of them back. Saved analyses are not touched.
 *
 * @param db database
 * @param files where the bytes are kept
 * @param request which dataset, columns and units, sample facts, rows to put back
 * @throws DomainError `invalid` with the place when a column, unit or sample fact does not do
 */
export async function mapDataset(db: Database, files: FileStore, request: MapDatasetInput & { datasetId: string, actor: Actor }): Promise<MappingReply> {
  const { datasetId, actor, columns, restoredRows } = request
  const { dataset: { role } } = await datasetFor(db, datasetId, actor, 'dataset:upload')
  const sample = role === 'addenda' ? null : sampleOf(request.sample)
  if (!sample) atFormField(() => requireTotalUnit(columns.heatCapacity.unit))
  // Read before the transaction: half a million rows take a second, during which nobody should wait.
  const table = readTable((await readRawFile(db, files, { datasetId, actor })).content)
  const { curve, rejectedRows, conversionUses } = atFormField(() => applyMapping(table, columns, sample ?? WHOLE_HOLDER, restoredRows))

  return db.transaction(async (tx) => {
    const { dataset } = await datasetFor(tx, datasetId, actor, 'dataset:upload')
    await checkSample(tx, dataset.runId, request.sampleId)
    await tx.update(datasets).set({
      sampleId: request.sampleId ?? null,
      mapping: { columns, sample, heads: [...table.heads], conversionUses: sample ? [...conversionUses] : [], rowNumbers: curve.rowNumbers && packRows(curve.rowNumbers) },
      rowCount: table.rowCount,
      rejectedRows: [...rejectedRows],
      temperatureK: [...curve.temperatureK],
      heatCapacity: [...curve.heatCapacity],
      sigma: curve.sigma ? [...curve.sigma] : null,
    }).where(eq(datasets.id, datasetId))
    await writeAudit(tx, { actorId: actor.personId, action: 'dataset:map', objectType: 'dataset', objectId: datasetId, detail: { columns, restoredRows, points: curve.temperatureK.length } })
    return { pointCount: curve.temperatureK.length, rejectedRows: [...rejectedRows], conversionUses: sample ? [...conversionUses] : [] }
  })
}

/**
 * The sample facts of a form with molar mass and atoms per formula unit from its formula.
 *
 * @param input facts as typed
 * @throws DomainError when the formula is none
 */
export function sampleOf(input: AnalysisSampleInput | undefined): HeatCapacitySample {
  if (!input) throw new DomainError('invalid', 'Enter the chemical formula of the sample, such as Cu or Al2O3.', ['sample', 'formula'])
  return { ...input, ...atFormField(() => parseFormula(input.formula)) }
}

/** The engine names a column or a sample fact; the form has them under `columns` and `sample`. */
function atFormField<T>(work: () => T): T {
  try {
    return work()
  }
  catch (error) {
    if (!(error instanceof DomainError)) throw error
    const [first, ...rest] = error.path
    throw new DomainError(error.code, error.message, first === 'mapping' ? ['columns', ...rest] : first === 'file' ? error.path : ['sample', ...error.path])
  }
}

/** A sample of another run, or of another group, cannot be named. */
async function checkSample(tx: Database, runId: string, sampleId: string | null | undefined) {
  if (!sampleId) return
  const [onRun] = await tx.select().from(runSamples).where(and(eq(runSamples.runId, runId), eq(runSamples.sampleId, sampleId)))
  if (!onRun) throw new DomainError('invalid', 'This sample is not on the run. Choose one of the run\'s samples.', ['sampleId'])
}
