import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { eq } from 'drizzle-orm'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Actor } from '#shared/access/rules'
import { mapDatasetSchema } from '#shared/schemas/results'
import { type FileStore, openFileStore } from '#server/adapters/storage/files'
import type { OpenDatabase } from '#server/db/client'
import { datasets } from '#server/db/schema'
import { mapDataset } from '#server/services/results/map-dataset'
import { previewTable } from '#server/services/results/preview-table'
import { uploadDataset } from '#server/services/results/upload-dataset'
import { DRIVERS, openTestDatabase } from '../support/database'
import { insertTestFacility, insertTestRun, type TestFacility } from '../support/rows'

/** Semicolons, decimal commas, CRLF, a comment, a word for a number, a negative value, a temperature in millikelvin. */
const TABLE = '# sweep of 4 May\r\nT/mK;C/(J/(mol K));u(C)/%\r\n2000;0,00177;1\r\n3000;n/a;1\r\n1500;-0,0001;1\r\n4000;0,0058;1,5\r\n'
const COLUMNS = { temperature: { column: 0, unit: 'mK' }, heatCapacity: { column: 1, unit: 'J/(mol K)' }, sigma: { column: 2, unit: '%' } }

describe.each(DRIVERS)('mapping a table, on %s', (driver) => {
  let open: OpenDatabase
  let facility: TestFacility
  let dataFolder: string
  let files: FileStore
  let actor: Actor
  let runId: string

  beforeAll(async () => {
    open = await openTestDatabase(driver)
    facility = await insertTestFacility(open.db)
    actor = { personId: facility.personId, isManager: false, isOperator: false, memberships: [{ groupId: facility.groupId, role: 'member' }] }
    dataFolder = await mkdtemp(join(tmpdir(), 'holdtime-mapping-'))
    files = openFileStore({ dataFolder })
    runId = (await insertTestRun(open.db, facility, 'finished', '2027-01-04T08:00Z', '2027-01-08T08:00Z')).id
  })
  afterAll(async () => {
    await open.close()
    await rm(dataFolder, { recursive: true })
  })

  const upload = async (text: string) => (await uploadDataset(open.db, files, { runId, role: 'measurement', file: { name: 'sweep.csv', content: new TextEncoder().encode(text) }, actor })).datasetId
  const map = (datasetId: string, more: object = {}, by = actor) => mapDataset(open.db, files, { ...mapDatasetSchema.parse({ columns: COLUMNS, sample: { formula: 'Cu', kind: 'metal', massMg: null }, ...more }), datasetId, actor: by })
  const stored = async (datasetId: string) => (await open.db.select().from(datasets).where(eq(datasets.id, datasetId)))[0]!

  it('keeps the curve in mJ/(mol K) by rising temperature, and lists every row left out with its line', async () => {
    const datasetId = await upload(TABLE)
    const reply = await map(datasetId)
    expect(reply.pointCount).toBe(2)
    expect(reply.rejectedRows.map(({ row, restorable }) => [row, restorable])).toEqual([[4, false], [5, false]])
    expect(reply.rejectedRows[0]!.reason).toContain('n/a')
    const row = await stored(datasetId)
    expect(row.temperatureK).toEqual([2, 4])
    row.heatCapacity!.forEach((value, index) => expect(value).toBeCloseTo([1.77, 5.8][index]!, 12))
    // 1 % of 1.77 and 1.5 % of 5.8
    row.sigma!.forEach((value, index) => expect(value).toBeCloseTo([0.0177, 0.087][index]!, 12))
    expect(row.mapping).toMatchObject({ sample: { formula: 'Cu', atomsPerFormulaUnit: 1, kind: 'metal' }, rowNumbers: [3, 6] })
    expect(row.rowCount).toBe(4)
  })

  it('puts a row back and leaves it out again', async () => {
    const datasetId = await upload('T/K,C/(mJ/(mol K)),σ(C)/(mJ/(mol K))\n2,1.77,0.1\n0.1,-0.02,0.05\n3,3.3,0.1\n')
    const columns = { temperature: { column: 0, unit: 'K' }, heatCapacity: { column: 1, unit: 'mJ/(mol K)' }, sigma: { column: 2, unit: 'mJ/(mol K)' } }
    expect((await map(datasetId, { columns })).rejectedRows).toMatchObject([{ row: 3, restorable: true, restored: false }])
    expect(await map(datasetId, { columns, restoredRows: [3] })).toMatchObject({ pointCount: 3, rejectedRows: [{ row: 3, restored: true }] })
    expect((await stored(datasetId)).temperatureK).toEqual([0.1, 2, 3])
    expect((await map(datasetId, { columns })).pointCount).toBe(2)
  })

  it('names the field at fault and keeps what was there before', async () => {
    const datasetId = await upload(`${TABLE}5000;0,01;1\r\n`)
    await map(datasetId)
    const before = await stored(datasetId)
    await expect(map(datasetId, { sample: { formula: 'Xy2', kind: 'metal' } })).rejects.toMatchObject({ code: 'invalid', path: ['sample', 'formula'] })
    await expect(map(datasetId, { columns: { ...COLUMNS, heatCapacity: { column: 1, unit: 'J/K' } } })).rejects.toMatchObject({ code: 'invalid', path: ['sample', 'massMg'] })
    await expect(map(datasetId, { columns: { ...COLUMNS, sigma: { column: 9, unit: '%' } } })).rejects.toMatchObject({ code: 'invalid', path: ['columns', 'sigma'] })
    await expect(map(datasetId, { sampleId: '018f0000-0000-7000-8000-000000000001' })).rejects.toMatchObject({ path: ['sampleId'] })
    await expect(map(datasetId, {}, { ...actor, memberships: [] })).rejects.toMatchObject({ code: 'not-found' })
    expect(await stored(datasetId)).toEqual(before)
  })

  it('remembers the columns for the next file with the same heads, within the group', async () => {
    await map(await upload(TABLE))
    const next = await upload(TABLE.replace('4 May', '5 May'))
    const preview = await previewTable(open.db, files, { datasetId: next, actor })
    expect(preview).toMatchObject({ heads: ['T/mK', 'C/(J/(mol K))', 'u(C)/%'], delimiter: 'semicolon', decimal: 'comma', remembered: { columns: COLUMNS, from: 'sweep.csv' } })
    expect(preview.rows[0]).toEqual({ row: 3, cells: ['2000', '0,00177', '1'] })
    const other = await upload('T/K,C/(J/K)\n2,0.1\n3,0.2\n')
    expect((await previewTable(open.db, files, { datasetId: other, actor })).remembered).toBeNull()
  })

  it('previews a file of many rows from its beginning', async () => {
    const rows = Array.from({ length: 60_000 }, (_, index) => `${(2 + index / 1000).toFixed(3)},${(1 + index / 500).toFixed(4)}`)
    const datasetId = await upload(`T/K,C/(mJ/(mol K))\n${rows.join('\n')}\n`)
    expect((await previewTable(open.db, files, { datasetId, actor })).rows).toHaveLength(8)
    const columns = { temperature: { column: 0, unit: 'K' }, heatCapacity: { column: 1, unit: 'mJ/(mol K)' } }
    expect((await map(datasetId, { columns })).pointCount).toBe(60_000)
    expect((await stored(datasetId)).sigma).toBeNull()
  })
})
