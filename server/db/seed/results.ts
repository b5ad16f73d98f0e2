import { and, eq } from 'drizzle-orm'
import type { Actor } from '#shared/access/rules'
import { adviseWindow } from '#shared/heat-capacity/window-advice'
import { beta3FromDebyeTemperature } from '#shared/heat-capacity/debye'
import type { FileStore } from '#server/adapters/storage/files'
import type { Database } from '#server/db/client'
import { analyses, datasets, groupMemberships, runs } from '#server/db/schema'
import { mapDataset } from '#server/services/results/map-dataset'
import { saveAnalysis } from '#server/services/results/save-analysis'
import { signOff } from '#server/services/results/sign-off'
import { uploadDataset } from '#server/services/results/upload-dataset'
import { MODEL_TERMS } from '#shared/schemas/heat-capacity'
import { copperReferenceHeatCapacity, COPPER_REFERENCE_RANGE_K } from '#shared/materials/copper-reference'
import type { Random } from './random'
import type { SeededRun } from './runs'
import { weighingMg } from './samples'

/** What seeding results needs. */
export interface ResultTools { files: FileStore, random: Random, now: Date }

const POINTS = 40
const NOISE = 0.008
/** One result in so many carries a slip, as in life. */
const SLIP_CHANCE = 0.09
const SHARE_WITH_RESULT = 0.45
/** A 9 K span is read to about one percent. */
const HIGHEST_K = 12

/**
 * Results of past runs: tables as a calorimeter would have written them, mapped, analysed and mostly signed, with the
 * very services that people use. Some carry a slip that the checks must find.
 *
 * @param db database with the runs
 * @param past finished runs
 * @param tools file store and number source
 */
export async function seedResults(db: Database, past: SeededRun[], tools: ResultTools): Promise<void> {
  const { random, now } = tools
  const measured = past.filter(({ spec, run }) => spec.temperatureLowK < 6 && (run.title === 'Cu standard' || random.chance(SHARE_WITH_RESULT)))
  for (const seeded of measured) await seedResult(db, seeded, tools)
  await signOlder(db, now)
}

async function seedResult(db: Database, { run, spec, group }: SeededRun, { files, random }: ResultTools) {
  const actor: Actor = { personId: group.memberId, isManager: false, isOperator: false, memberships: [{ groupId: group.id, role: 'member' }] }
  const factor = random.chance(SLIP_CHANCE) ? random.pick([1000, 0.001]) : 1
  const isStandard = run.title === 'Cu standard'
  const { datasetId } = await uploadDataset(db, files, { runId: run.id, role: isStandard ? 'copper-standard' : 'measurement', file: { name: `run-${run.number}.csv`, content: new TextEncoder().encode(tableOf(spec, factor, random)) }, actor, now: new Date(run.finishedAt!.getTime() + 1_800_000) })
  const { sample } = spec
  await mapDataset(db, files, {
    datasetId, actor, restoredRows: [], sampleId: sample.id,
    columns: { temperature: { column: 0, unit: 'K' }, heatCapacity: { column: 1, unit: 'mJ/(mol K)' }, sigma: { column: 2, unit: 'mJ/(mol K)' } },
    sample: {
      formula: sample.formula, kind: sample.kind, conductionElectrons: sample.conductionElectrons, massMg: sample.massMg, massUncertaintyMg: weighingMg(sample.massMg),
    },
  })
  const [dataset] = await db.select().from(datasets).where(eq(datasets.id, datasetId))
  const curve = { temperatureK: dataset!.temperatureK ?? [], heatCapacity: dataset!.heatCapacity ?? [], sigma: dataset!.sigma ?? undefined }
  const advice = adviseWindow(curve, { atomsPerFormulaUnit: sample.atomsPerFormulaUnit })
  const terms = sample.tail ? ['gamma', 'beta3', 'tail'] as const : MODEL_TERMS.filter(term => advice.terms.includes(term))
  await saveAnalysis(db, { datasetId, actor, model: { terms: [...terms], windowK: [...(sample.tail ? [spec.temperatureLowK, 9] as const : advice.windowK)] }, now: new Date(run.finishedAt!.getTime() + 3_600_000) })
}

/** γT + β₃T³ with a tail where the substance has one, or the copper reference; noise of the size it states. */
function tableOf({ sample, temperatureLowK, temperatureHighK }: SeededRun['spec'], factor: number, random: Random): string {
  const highest = Math.min(temperatureHighK, HIGHEST_K)
  const lowest = sample.key === 'cu' ? Math.max(temperatureLowK, COPPER_REFERENCE_RANGE_K[0]) : temperatureLowK
  const beta3 = beta3FromDebyeTemperature(sample.debyeTemperatureK, sample.atomsPerFormulaUnit)
  const offset = random.normal(1, 0.004)
  const rows = Array.from({ length: POINTS }, (_, index) => {
    const kelvin = Math.sqrt(lowest ** 2 + (highest ** 2 - lowest ** 2) * index / (POINTS - 1))
    const exact = sample.key === 'cu' ? copperReferenceHeatCapacity(kelvin) : sample.gamma * kelvin + beta3 * kelvin ** 3 + (sample.tail ?? 0) / kelvin ** 2
    const value = exact * offset * (1 + random.normal(0, NOISE)) * factor
    return `${kelvin.toFixed(4)},${value.toPrecision(6)},${(exact * NOISE * factor).toPrecision(3)}`
  })
  return `T/K,C/(mJ/(mol K)),σ(C)/(mJ/(mol K))\n${rows.join('\n')}\n`
}

/** Most results older than two weeks are signed by the PI of their group; those that fail are refused with a reason. */
async function signOlder(db: Database, now: Date) {
  const rows = await db.select({ analysis: analyses, groupId: groupMemberships.groupId, personId: groupMemberships.personId }).from(analyses)
    .innerJoin(datasets, eq(datasets.id, analyses.datasetId)).innerJoin(runs, eq(runs.id, datasets.runId))
    .innerJoin(groupMemberships, and(eq(groupMemberships.groupId, runs.groupId), eq(groupMemberships.role, 'pi'))).orderBy(analyses.createdAt)
  for (const [index, { analysis, groupId, personId }] of rows.entries()) {
    if (now.getTime() - analysis.createdAt.getTime() < 14 * 86_400_000 || index % 7 === 3) continue
    const accepted = analysis.verdict !== 'fail'
    await signOff(db, {
      analysisId: analysis.id, accepted, reason: accepted ? 'Seen with the raw data.' : 'The scale is off; the table must be read again with the right unit.',
      actor: { personId, isManager: false, isOperator: false, memberships: [{ groupId, role: 'pi' }] }, now: new Date(analysis.createdAt.getTime() + 2 * 86_400_000),
    })
  }
}
