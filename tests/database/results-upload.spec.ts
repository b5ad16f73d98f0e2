import { mkdtemp, readdir, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Actor } from '#shared/access/rules'
import { type FileStore, openFileStore } from '#server/adapters/storage/files'
import type { OpenDatabase } from '#server/db/client'
import { datasets } from '#server/db/schema'
import { readRawFile } from '#server/services/results/raw-file'
import { uploadDataset } from '#server/services/results/upload-dataset'
import { DRIVERS, openTestDatabase } from '../support/database'
import { insertTestFacility, insertTestRun, type TestFacility } from '../support/rows'

const TABLE = new TextEncoder().encode('T/K;C/(mJ/(mol K))\r\n2,0;1,77\r\n3,0;3,37\r\n')
const stranger: Actor = { personId: '018f0000-0000-7000-8000-000000000000', isManager: false, isOperator: false, memberships: [] }

describe.each(DRIVERS)('uploading a table, on %s', (driver) => {
  let open: OpenDatabase
  let facility: TestFacility
  let dataFolder: string
  let files: FileStore
  let member: Actor
  let runId: string

  beforeAll(async () => {
    open = await openTestDatabase(driver)
    facility = await insertTestFacility(open.db)
    member = { personId: facility.personId, isManager: false, isOperator: false, memberships: [{ groupId: facility.groupId, role: 'member' }] }
    dataFolder = await mkdtemp(join(tmpdir(), 'holdtime-upload-'))
    files = openFileStore({ dataFolder })
    runId = (await insertTestRun(open.db, facility, 'running', '2027-01-04T08:00Z', '2027-01-08T08:00Z')).id
  })
  afterAll(async () => {
    await open.close()
    await rm(dataFolder, { recursive: true })
  })

  const keptFiles = () => readdir(join(dataFolder, 'files'))

  it('keeps the bytes as they came, and the same file twice as one dataset', async () => {
    const upload = { runId, role: 'measurement' as const, file: { name: '../../up\r\nper.csv', content: TABLE }, actor: member }
    const first = await uploadDataset(open.db, files, upload)
    expect(first.existed).toBe(false)
    expect(await uploadDataset(open.db, files, upload)).toEqual({ datasetId: first.datasetId, existed: true })
    const raw = await readRawFile(open.db, files, { datasetId: first.datasetId, actor: member })
    expect(new Uint8Array(raw.content)).toEqual(TABLE)
    expect(raw.originalName).toBe('up  per.csv')
    expect(await keptFiles()).toHaveLength(1)
  })

  it('makes one dataset of ten uploads at once and leaves no stray file', async () => {
    const before = (await keptFiles()).length
    const content = new TextEncoder().encode('T/K,C/(mJ/(mol K))\n4,5\n5,9\n')
    const replies = await Promise.all(Array.from({ length: 10 }, () => uploadDataset(open.db, files, { runId, role: 'measurement', file: { name: 'a.csv', content }, actor: member })))
    expect(new Set(replies.map(reply => reply.datasetId)).size).toBe(1)
    expect(await keptFiles()).toHaveLength(before + 1)
  })

  it('refuses what is no table, a run that was not measured, and a stranger, and keeps nothing of them', async () => {
    const filesBefore = (await keptFiles()).length
    const rowsBefore = (await open.db.select().from(datasets)).length
    const asked = await insertTestRun(open.db, facility, 'asked', '2027-02-01T08:00Z', '2027-02-02T08:00Z')
    const attempt = (more: object) => uploadDataset(open.db, files, { runId, role: 'measurement', file: { name: 'a.csv', content: new TextEncoder().encode('T/K,C\n1,2\n') }, actor: member, ...more })
    await expect(attempt({ file: { name: 'a.csv', content: Uint8Array.of(0x50, 0x4b, 3, 4, 9) } })).rejects.toMatchObject({ code: 'invalid', path: ['file'] })
    await expect(attempt({ file: null })).rejects.toMatchObject({ code: 'invalid', path: ['file'] })
    await expect(attempt({ runId: asked.id })).rejects.toMatchObject({ code: 'conflict' })
    await expect(attempt({ actor: stranger })).rejects.toMatchObject({ code: 'not-found' })
    expect(await keptFiles()).toHaveLength(filesBefore)
    expect(await open.db.select().from(datasets)).toHaveLength(rowsBefore)
  })

  it('refuses to hand out a file that is no longer the one uploaded', async () => {
    const { datasetId } = await uploadDataset(open.db, files, { runId, role: 'addenda', file: { name: 'b.csv', content: TABLE }, actor: member })
    const [row] = (await open.db.select().from(datasets)).filter(dataset => dataset.id === datasetId)
    await writeFile(join(dataFolder, 'files', row!.fileKey), 'changed')
    await expect(readRawFile(open.db, files, { datasetId, actor: member })).rejects.toThrow('not the one that was uploaded')
  })
})
