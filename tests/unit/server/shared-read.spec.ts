import { describe, expect, it } from 'vitest'
import type { Database } from '#server/db/client'
import { sharedRead } from '#server/utils/shared-read'

/** A read whose queries the test lets finish one by one, on a database whose snapshot the test moves on. */
function controlled() {
  const started: { finish: (value: string) => void, fail: (error: Error) => void }[] = []
  const read = sharedRead<string, string>(key => key, () => new Promise((finish, fail) => started.push({ finish, fail })))
  const database = { snapshot: 1, execute: async () => ({ rows: [{ snapshot: String(database.snapshot) }] }) }
  return { started, read: (key: string) => read(database as unknown as Database, key), commit: () => database.snapshot += 1 }
}
const immediate = () => new Promise(resolve => setImmediate(resolve))
/** Long enough for a read that may begin to have begun. */
const turn = async () => {
  await immediate()
  await immediate()
}

describe('sharedRead', () => {
  it('shares one query among all who asked before it began', async () => {
    const { started, read } = controlled()
    const readers = [read('a'), read('a'), read('a')]
    await turn()
    expect(started).toHaveLength(1)
    started[0]?.finish('board')
    expect(await Promise.all(readers)).toEqual(['board', 'board', 'board'])
  })

  it('never shares a query that has begun: later readers wait for it and share the next', async () => {
    const { started, read, commit } = controlled()
    const first = read('a')
    await turn()
    commit()
    const later = [read('a'), read('a')]
    await turn()
    expect(started).toHaveLength(1)
    started[0]?.finish('before')
    expect(await first).toBe('before')
    await turn()
    expect(started).toHaveLength(2)
    started[1]?.finish('after')
    expect(await Promise.all(later)).toEqual(['after', 'after'])
  })

  it('uses a result again only while nothing was committed', async () => {
    const { started, read, commit } = controlled()
    const first = read('a')
    await turn()
    started[0]?.finish('one')
    expect(await first).toBe('one')
    expect(await read('a')).toBe('one')
    expect(started).toHaveLength(1)
    commit()
    const second = read('a')
    await turn()
    expect(started).toHaveLength(2)
    started[1]?.finish('two')
    expect(await second).toBe('two')
  })

  it('does not keep what was read while something was committed', async () => {
    const { started, read, commit } = controlled()
    const first = read('a')
    await turn()
    commit()
    started[0]?.finish('perhaps old')
    await first
    void read('a')
    await turn()
    expect(started).toHaveLength(2)
  })

  it('does not pass a failure on to those who asked later', async () => {
    const { started, read } = controlled()
    const first = read('a')
    await turn()
    const second = read('a')
    started[0]?.fail(new Error('lost'))
    await expect(first).rejects.toThrow('lost')
    await turn()
    started[1]?.finish('found')
    expect(await second).toBe('found')
  })

  it('reads different things side by side', async () => {
    const { started, read } = controlled()
    void read('a')
    void read('b')
    await turn()
    expect(started).toHaveLength(2)
  })
})
