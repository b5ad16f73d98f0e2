import { mkdtemp, readdir, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { openFileStore } from '#server/adapters/storage/files'

describe('the file store', () => {
  let dataFolder: string
  beforeAll(async () => {
    dataFolder = await mkdtemp(join(tmpdir(), 'holdtime-files-'))
  })
  afterAll(() => rm(dataFolder, { recursive: true }))

  it('gives back every byte, whatever it is, and a SHA-256 that others compute too', async () => {
    const store = openFileStore({ dataFolder })
    const content = Uint8Array.from({ length: 256 }, (_, byte) => byte)
    const kept = await store.putFile(content)
    // printf of bytes 0 to 255 through sha256sum
    expect(kept.sha256).toBe('40aff2e9d2d8922e47afd4648e6967497158785fbd1da870e7110266bf944880')
    expect(new Uint8Array((await store.getFile(kept.key))!)).toEqual(content)
    expect(await readdir(join(dataFolder, 'files'))).toEqual([kept.key])
    await store.removeFile(kept.key)
    expect(await store.getFile(kept.key)).toBeNull()
  })

  it('keeps a part of a larger buffer as that part only', async () => {
    const store = openFileStore({ dataFolder })
    const kept = await store.putFile(new Uint8Array([1, 2, 3, 4]).subarray(1, 3))
    expect([...(await store.getFile(kept.key))!]).toEqual([2, 3])
  })

  it.each(['../../etc/passwd', 'a'.repeat(31), `${'a'.repeat(31)}:`, ''])('refuses the key %j before it reaches the disk', async (key) => {
    const store = openFileStore({ dataFolder })
    await expect((async () => store.getFile(key))()).rejects.toThrow('not a key')
  })
})
