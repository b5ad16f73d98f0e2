import { mkdtemp, readFile, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { eq } from 'drizzle-orm'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Actor } from '#shared/access/rules'
import { copperReferenceHeatCapacity } from '#shared/materials/copper-reference'
import { mapDatasetSchema, saveAnalysisSchema } from '#shared/schemas/results'
import type { DatasetRole } from '#shared/types/results'
import { type FileStore, openFileStore } from '#server/adapters/storage/files'
import { constraintOf } from '#server/db/constraint'
import type { OpenDatabase } from '#server/db/client'
import { analyses, facilities } from '#server/db/schema'
import { getAnalysis } from '#server/services/results/get-analysis'
import { getDataset, getPoints } from '#server/services/results/get-dataset'
import { mapDataset } from '#server/services/results/map-dataset'
import { saveAnalysis } from '#server/services/results/save-analysis'
import { signOff } from '#server/services/results/sign-off'
import { uploadDataset } from '#server/services/results/upload-dataset'
import { insertFacilityRow } from '../support/board-rows'
import { DRIVERS, openTestDatabase } from '../support/database'
import { insertTestFacility, insertTestRun, type TestFacility } from '../support/rows'

const reference = (file: string) => readFile(new URL(`../reference/data/heat-capacity/${file}`, import.meta.url))
const OXIDE = { columns: { temperature: { column: 0, unit: 'K' }, heatCapacity: { column: 1, unit: 'J/(mol K)' } }, sample: { formula: 'Dy2O3', kind: 'insulator' } }
const COPPER = { columns: { temperature: { column: 0, unit: 'K' }, heatCapacity: { column: 1, unit: 'mJ/(mol K)' }, sigma: { column: 2, unit: '%' } }, sample: { formula: 'Cu', kind: 'metal', conductionElectrons: 1 } }

/** Copper by the published reference equation, 1.5 to 6.9 K, times a factor, with half a per cent of stated error. */
function copperTable(factor = 1): string {
  const rows = Array.from({ length: 28 }, (_, index) => 1.5 + index * 0.2).map(temperature => `${temperature.toFixed(2)},${factor * copperReferenceHeatCapacity(Number(temperature.toFixed(2)))},0.5`)
  return `T/K,C/(mJ/(mol K)),u(C)/%\n${rows.join('\n')}\n`
}

describe.each(DRIVERS)('saving analyses, on %s', (driver) => {
  let open: OpenDatabase
  let facility: TestFacility
  let dataFolder: string
  let files: FileStore
  let actor: Actor
  let runId: string
  let minute = 0

  beforeAll(async () => {
    open = await openTestDatabase(driver)
    await insertFacilityRow(open.db)
    facility = await insertTestFacility(open.db)
    actor = { personId: facility.personId, isManager: false, isOperator: false, memberships: [{ groupId: facility.groupId, role: 'pi' }] }
    dataFolder = await mkdtemp(join(tmpdir(), 'holdtime-analysis-'))
    files = openFileStore({ dataFolder })
    runId = (await insertTestRun(open.db, facility, 'finished', '2027-01-04T08:00Z', '2027-01-08T08:00Z')).id
  })
  afterAll(async () => {
    await open.close()
    await rm(dataFolder, { recursive: true })
  })

  async function dataset(content: string | Uint8Array, mapping: object, role: DatasetRole = 'measurement') {
    const bytes = typeof content === 'string' ? new TextEncoder().encode(content) : content
    const { datasetId } = await uploadDataset(open.db, files, { runId, role, file: { name: 'table.csv', content: bytes }, actor })
    await mapDataset(open.db, files, { ...mapDatasetSchema.parse(mapping), datasetId, actor })
    return datasetId
  }
  const save = (datasetId: string, terms: string[], windowK: [number, number], more: object = {}) => {
    minute += 1
    return saveAnalysis(open.db, { ...saveAnalysisSchema.parse({ model: { terms, windowK }, ...more }), datasetId, actor, now: new Date(Date.UTC(2027, 0, 9, 8, minute)) })
  }
  const read = (analysisId: string) => getAnalysis(open.db, { analysisId, actor })
  const statusOf = async (analysisId: string, id: string) => (await read(analysisId)).result.checks.find(check => check.id === id)?.status

  it('refuses the plain fit of the measured oxide with the upturn named, and gives γ = 0 within its error with the tail', async () => {
    const datasetId = await dataset(await reference('A_oxide_with_schottky_upturn_MIT.csv'), OXIDE)
    const plain = await save(datasetId, ['gamma', 'beta3'], [1.8, 14.5])
    expect((await read(plain.analysisId)).result.verdict).toBe('fail')
    expect(await statusOf(plain.analysisId, 'upturn')).toBe('fail')
    const tail = (await read((await save(datasetId, ['gamma', 'beta3', 'tail'], [1.8, 14.5])).analysisId)).result.fit.coefficients
    // Independently fitted values and errors of PROVENANCE.json (1 % relative weights), there in J
    expect(tail.tail!.value / 498.670307688).toBeCloseTo(1, 3)
    expect(tail.beta3!.value / 0.4281294232780009).toBeCloseTo(1, 3)
    expect(tail.gamma!.value / -0.230239605703).toBeCloseTo(1, 3)
    expect(tail.gamma!.standardError / 0.215674590511).toBeCloseTo(1, 3)
    expect(Math.abs(tail.gamma!.value)).toBeLessThan(2 * tail.gamma!.standardError)
  })

  it('finds γ and Θ_D of copper, and keeps file, columns, window and engine with them', async () => {
    const datasetId = await dataset(copperTable(), COPPER)
    const { analysisId } = await save(datasetId, ['gamma', 'beta3'], [1.5, 6.9])
    const view = await read(analysisId)
    // Reference equation: A₁ = 0.69434, Θ_D = 344.5 K; its T⁵ and T⁷ terms bend a window up to 6.9 K by under 1 %.
    expect(Math.abs(view.result.fit.coefficients.gamma!.value / 0.69434 - 1)).toBeLessThan(0.02)
    expect(Math.abs(view.result.fit.debyeTemperature!.value / 344.5 - 1)).toBeLessThan(0.01)
    expect(view.result.verdict).not.toBe('fail')
    const meta = await getDataset(open.db, { datasetId, actor })
    expect(view.lineage).toMatchObject({ datasetId, fileSha256: meta.sha256, windowK: [1.5, 6.9], engineVersion: view.result.engineVersion, mapping: { sample: { formula: 'Cu' } } })
    expect(view.lineage.mapping).not.toHaveProperty('rowNumbers')
    expect(view.restsOnCurrentCurve).toBe(true)
    expect(meta.analyses).toHaveLength(1)
    expect((await getPoints(open.db, { datasetId, actor }))!.rowNumbers![0]).toBe(2)
  })

  it('never changes a saved analysis, whatever happens to columns and thresholds after', async () => {
    const datasetId = await dataset(copperTable(1.0001), COPPER)
    const { analysisId } = await save(datasetId, ['gamma', 'beta3'], [1.5, 6.9])
    const before = await read(analysisId)
    await mapDataset(open.db, files, { ...mapDatasetSchema.parse({ ...COPPER, columns: { ...COPPER.columns, heatCapacity: { column: 1, unit: 'J/(mol K)' } } }), datasetId, actor })
    await open.db.update(facilities).set({ checkThresholds: { coveragePoints: 200 } })
    expect(await read(analysisId)).toEqual({ ...before, restsOnCurrentCurve: false })
    await open.db.update(facilities).set({ checkThresholds: {} })
    const refusal = await open.db.update(analyses).set({ verdict: 'ok' }).where(eq(analyses.id, analysisId)).catch(constraintOf)
    expect(refusal).toBe('analyses_immutable')
  })

  it('offers the factor of a thousand, keeps the accepted correction in view, and takes no other', async () => {
    const datasetId = await dataset(copperTable(1000), COPPER)
    const wrong = await read((await save(datasetId, ['gamma', 'beta3'], [1.5, 6.9])).analysisId)
    expect(wrong.result.verdict).toBe('fail')
    expect(wrong.result.suggestions[0]).toMatchObject({ id: 'divide-by-1000', factor: 0.001 })
    const mended = await read((await save(datasetId, ['gamma', 'beta3'], [1.5, 6.9], { correctionId: 'divide-by-1000' })).analysisId)
    expect(Math.abs(mended.result.fit.coefficients.gamma!.value / 0.69434 - 1)).toBeLessThan(0.02)
    expect(mended.result.verdict).not.toBe('fail')
    expect(mended.lineage.correction).toMatchObject({ id: 'divide-by-1000', factor: 0.001 })
    const good = await dataset(copperTable(1.0002), COPPER)
    await expect(save(good, ['gamma', 'beta3'], [1.5, 6.9], { correctionId: 'multiply-by-1000' })).rejects.toMatchObject({ code: 'conflict', path: ['correctionId'] })
  })

  it('saves once when pressed twice, and asks for a new signature after a new analysis', async () => {
    const datasetId = await dataset(copperTable(1.0003), COPPER)
    const first = await save(datasetId, ['gamma', 'beta3'], [1.5, 6.9])
    expect(await save(datasetId, ['gamma', 'beta3'], [1.5, 6.9])).toEqual({ analysisId: first.analysisId, existed: true })
    await signOff(open.db, { analysisId: first.analysisId, accepted: true, reason: 'Agrees with the handbook.', actor, now: new Date() })
    const second = await save(datasetId, ['gamma', 'beta3'], [1.5, 5])
    expect(second.existed).toBe(false)
    expect((await getDataset(open.db, { datasetId, actor })).analyses.map(({ id, signed }) => [id, signed])).toEqual([[second.analysisId, null], [first.analysisId, 'accepted']])
  })

  it('takes off addenda of the whole holder by the mass of the sample', async () => {
    // 63.546 mg are 1 mmol: 0.001 mJ/K of the holder are 1 mJ/(mol K)
    const holder = await dataset(`T/K,C/(µJ/K)\n1,${0.5}\n4,${2}\n8,${4}\n`, { columns: { temperature: { column: 0, unit: 'K' }, heatCapacity: { column: 1, unit: 'µJ/K' } } }, 'addenda')
    const total = copperTable().split('\n').map((line, index) => {
      const [temperature, heatCapacity, sigma] = line.split(',')
      return index === 0 || !temperature ? line : `${temperature},${Number(heatCapacity) + 0.5 * Number(temperature)},${sigma}`
    }).join('\n')
    const withMass = { ...COPPER, sample: { ...COPPER.sample, massMg: 63.546 } }
    const datasetId = await dataset(total, withMass)
    const heavy = await read((await save(datasetId, ['gamma', 'beta3'], [1.5, 6.9])).analysisId)
    const net = await read((await save(datasetId, ['gamma', 'beta3'], [1.5, 6.9], { addendaDatasetId: holder })).analysisId)
    // The holder's 0.5 mJ/(mol K²) T stand in γ until they are taken off.
    expect(heavy.result.fit.coefficients.gamma!.value - net.result.fit.coefficients.gamma!.value).toBeCloseTo(0.5, 6)
    expect(net.lineage.addenda?.datasetId).toBe(holder)
    const noMass = await dataset(`${total}# again\n`, COPPER)
    await expect(save(noMass, ['gamma', 'beta3'], [1.5, 6.9], { addendaDatasetId: holder })).rejects.toMatchObject({ code: 'invalid', path: ['sample', 'massMg'] })
    await expect(save(holder, ['gamma', 'beta3'], [1.5, 6.9])).rejects.toMatchObject({ code: 'conflict' })
    await expect(dataset('T/K,C\n1,2\n2,3\n', { columns: { temperature: { column: 0, unit: 'K' }, heatCapacity: { column: 1, unit: 'J/(mol K)' } } }, 'addenda')).rejects.toMatchObject({ path: ['columns', 'heatCapacity'] })
  })

  it('cites the last copper reading of the cryostat', async () => {
    const own = await insertTestFacility(open.db)
    const before = runId
    runId = (await insertTestRun(open.db, { ...facility, cryostatId: own.cryostatId }, 'finished', '2027-02-04T08:00Z', '2027-02-08T08:00Z')).id
    const first = await dataset(copperTable(1.0004), COPPER)
    expect(await statusOf((await save(first, ['gamma', 'beta3'], [1.5, 6.9])).analysisId, 'standard')).toBe('not-applicable')
    const standard = await dataset(copperTable(1.05), COPPER, 'copper-standard')
    const after = await dataset(copperTable(1.0005), COPPER)
    const check = (await read((await save(after, ['gamma', 'beta3'], [1.5, 6.9])).analysisId)).result.checks.find(each => each.id === 'standard')
    expect(check?.status).toBe('caution')
    expect(check?.value).toBeCloseTo(5, 6)
    const meta = await getDataset(open.db, { datasetId: standard, actor })
    expect(meta.copperHistory).toMatchObject([{ datasetId: standard, pointCount: 28 }])
    expect(meta.copperStandard).toBeNull()
    runId = before
  })

  it('names what the window does not allow, and needs confirmed columns', async () => {
    const datasetId = await dataset(copperTable(1.0006), COPPER)
    await expect(save(datasetId, ['gamma', 'beta3'], [100, 200])).rejects.toMatchObject({ code: 'invalid', path: ['windowK'] })
    const { datasetId: raw } = await uploadDataset(open.db, files, { runId, role: 'measurement', file: { name: 'raw.csv', content: new TextEncoder().encode(copperTable(1.0007)) }, actor })
    await expect(save(raw, ['gamma', 'beta3'], [1.5, 6.9])).rejects.toMatchObject({ code: 'conflict' })
    await expect(saveAnalysis(open.db, { model: { terms: ['gamma', 'beta3'], windowK: [1.5, 6.9] }, datasetId, actor: { ...actor, memberships: [] }, now: new Date() })).rejects.toMatchObject({ code: 'not-found' })
  })
})
