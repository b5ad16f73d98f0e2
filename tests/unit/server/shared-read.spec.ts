import { describe, expect, it } from 'vitest'
import type { Database } from '#server/db/client'
import { sharedRead } from '#server/utils/shared-read'

/** A read whose queries the test lets finish one by one. */
function controlled() {
  const started: { finish: (value: string) => void, fail: (error: Error) => void }[] = []
  const read = sharedRead<string, string>(key => key, () => new Promise((finish, fail) => started.push({ finish, fail })))
  const db = {} as Database
  return { started, read: (key: string) => read(db, key) }
}
const settle = () => new Promise(resolve => setImmediate(resolve))

describe('sharedRead', () => {
  it('shares one query among all who asked while another was under way, and none with that one', async () => {
    const { started, read } = controlled()
    const first = read('a')
    const waiting = [read('a'), read('a'), read('a')]
    expect(started).toHaveLength(1)
    started[0]?.finish('before')
    expect(await first).toBe('before')
    await settle()
    expect(started).toHaveLength(2)
    started[1]?.finish('after')
    expect(await Promise.all(waiting)).toEqual(['after', 'after', 'after'])
  })

  it('keeps no result: whoever asks later gets a new query', async () => {
    const { started, read } = controlled()
    const first = read('a')
    started[0]?.finish('one')
    await first
    await settle()
    const second = read('a')
    expect(started).toHaveLength(2)
    started[1]?.finish('two')
    expect(await second).toBe('two')
  })

  it('does not pass a failure on to those who waited', async () => {
    const { started, read } = controlled()
    const first = read('a')
    const second = read('a')
    started[0]?.fail(new Error('lost'))
    await expect(first).rejects.toThrow('lost')
    await settle()
    started[1]?.finish('found')
    expect(await second).toBe('found')
  })

  it('reads different things side by side', () => {
    const { started, read } = controlled()
    void read('a')
    void read('b')
    expect(started).toHaveLength(2)
  })
})
