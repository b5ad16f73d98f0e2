import { createHash, randomBytes } from 'node:crypto'
import { join } from 'node:path'
import { createStorage, type Driver, type Storage } from 'unstorage'
import fsDriver from 'unstorage/drivers/fs-lite'

/** What is known of a file once it is kept. */
export interface StoredFile {
  /** Random, never made from anything a person typed. */
  key: string
  bytes: number
  /** Lower-case hexadecimal SHA-256 of the bytes as they came. */
  sha256: string
}

/** Files kept byte for byte, outside the web root. */
export interface FileStore {
  putFile(content: Uint8Array): Promise<StoredFile>
  /** The bytes as they came, or null when no such file is kept. */
  getFile(key: string): Promise<Buffer | null>
  removeFile(key: string): Promise<void>
}

const KEY = /^[0-9a-f]{32}$/

/**
 * Opens the file store.
 *
 * @param where the data folder, or another unstorage driver (an object store) that keeps raw values
 * @returns a store whose keys are 128 random bits; a key of any other form is refused before it reaches the disk
 */
export function openFileStore(where: { dataFolder: string } | { driver: Driver }): FileStore {
  const storage: Storage = createStorage({ driver: 'driver' in where ? where.driver : fsDriver({ base: join(where.dataFolder, 'files') }) })
  return {
    async putFile(content) {
      const key = randomBytes(16).toString('hex')
      await storage.setItemRaw(key, Buffer.from(content.buffer, content.byteOffset, content.byteLength))
      return { key, bytes: content.byteLength, sha256: sha256Of(content) }
    },
    async getFile(key) {
      const content = await storage.getItemRaw<Uint8Array>(checked(key))
      return content ? Buffer.from(content.buffer, content.byteOffset, content.byteLength) : null
    },
    removeFile: key => storage.removeItem(checked(key)),
  }
}

/** SHA-256 of bytes, lower-case hexadecimal. */
export function sha256Of(content: Uint8Array): string {
  return createHash('sha256').update(content).digest('hex')
}

function checked(key: string): string {
  if (!KEY.test(key)) throw new Error('not a key of the file store')
  return key
}
