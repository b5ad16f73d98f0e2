import type { Actor } from '#shared/access/rules'
import { type FileStore, sha256Of } from '#server/adapters/storage/files'
import type { Database } from '#server/db/client'
import { datasetFor } from './run-of'

/**
 * The uploaded file byte for byte.
 *
 * @param db database
 * @param files where the bytes are kept
 * @param request which dataset and who asks
 * @returns the bytes, the name they came under and their SHA-256
 * @throws Error when the file is gone or no longer the one that was uploaded
 */
export async function readRawFile(db: Database, files: FileStore, request: { datasetId: string, actor: Actor }): Promise<{ content: Buffer, originalName: string, sha256: string }> {
  const { dataset } = await datasetFor(db, request.datasetId, request.actor, 'dataset:read')
  const content = await files.getFile(dataset.fileKey)
  if (!content) throw new Error(`file of dataset ${dataset.id} is missing from the store`)
  if (sha256Of(content) !== dataset.sha256) throw new Error(`file of dataset ${dataset.id} is not the one that was uploaded`)
  return { content, originalName: dataset.originalName, sha256: dataset.sha256 }
}
