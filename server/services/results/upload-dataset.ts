import { and, eq } from 'drizzle-orm'
import type { Actor } from '#shared/access/rules'
import { DomainError } from '#shared/errors'
import type { RunState } from '#shared/runs/states'
import type { DatasetRole } from '#shared/types/results'
import { type FileStore, sha256Of } from '#server/adapters/storage/files'
import type { Database } from '#server/db/client'
import { datasets, runSamples, runs } from '#server/db/schema'
import { authorise } from '#server/services/access/authorise'
import { writeAudit } from '#server/services/audit/write-audit'
import { readTableStart } from './preview-table'

const STATES_WITH_RESULTS: readonly RunState[] = ['running', 'finished', 'settled']

/** An uploaded table as it came. */
export interface DatasetUpload {
  runId: string
  role: DatasetRole
  file: { name: string, content: Uint8Array } | null
  actor: Actor
  now?: Date
}

/**
 * Keeps an uploaded table with its SHA-256. The same file twice on a run is one dataset.
 *
 * @param db database
 * @param files where the bytes are kept
 * @param upload the run, what the table holds, and the file
 * @returns the dataset's id, and whether it was there already
 * @throws DomainError `invalid` for a file that is no text table, `conflict` before the run has started
 */
export async function uploadDataset(db: Database, files: FileStore, upload: DatasetUpload): Promise<{ datasetId: string, existed: boolean }> {
  const { runId, role, file, actor, now } = upload
  const [run] = await db.select().from(runs).where(eq(runs.id, runId))
  authorise(actor, 'dataset:upload', run ? { groupId: run.groupId } : {})
  if (!run) throw new DomainError('not-found', 'There is no such run.')
  if (!STATES_WITH_RESULTS.includes(run.state)) {
    throw new DomainError('conflict', `Run ${run.number} is ${run.state}: it has not been measured yet. Add results once it is running.`, ['file'])
  }
  if (!file) throw new DomainError('invalid', 'Choose a file with the measured table.', ['file'])
  readTableStart(file.content)

  const sha256 = sha256Of(file.content)
  const sameFile = and(eq(datasets.runId, runId), eq(datasets.sha256, sha256), eq(datasets.role, role))
  const [before] = await db.select({ id: datasets.id }).from(datasets).where(sameFile)
  if (before) return { datasetId: before.id, existed: true }

  const kept = await files.putFile(file.content)
  const added = await insertDataset(db, { runId, role, originalName: plainName(file.name), fileKey: kept.key, bytes: kept.bytes, sha256, uploadedBy: actor.personId, createdAt: now })
    .catch(async (error: unknown) => {
      await files.removeFile(kept.key)
      throw error
    })
  if (added) return { datasetId: added, existed: false }
  // Pressed twice at the same instant: the other request won.
  await files.removeFile(kept.key)
  const [winner] = await db.select({ id: datasets.id }).from(datasets).where(sameFile)
  return { datasetId: winner!.id, existed: true }
}

async function insertDataset(db: Database, row: Omit<typeof datasets.$inferInsert, 'sampleId'>): Promise<string | undefined> {
  return db.transaction(async (tx) => {
    const onRun = await tx.select({ sampleId: runSamples.sampleId }).from(runSamples).where(eq(runSamples.runId, row.runId))
    const sampleId = onRun.length === 1 && row.role !== 'copper-standard' ? onRun[0]!.sampleId : null
    const [added] = await tx.insert(datasets).values({ ...row, sampleId }).onConflictDoNothing().returning({ id: datasets.id })
    if (!added) return undefined
    await writeAudit(tx, { actorId: row.uploadedBy, action: 'dataset:upload', objectType: 'dataset', objectId: added.id, detail: { runId: row.runId, sha256: row.sha256, bytes: row.bytes } })
    return added.id
  })
}

/** The last part of a path as typed, without control characters, at most 200 characters: a label, never a path. */
function plainName(name: string): string {
  const label = name.split(/[/\\]/).at(-1)!.replace(/\p{Cc}/gu, ' ').trim()
  return [...label].slice(0, 200).join('') || 'table'
}
