import { spawnSync } from 'node:child_process'
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterEach, beforeEach, expect, it } from 'vitest'
import { FolderTakenError, lockFolder } from '#server/db/folder-lock'

let folder: string
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'holdtime-lock-'))
})
afterEach(() => rmSync(folder, { recursive: true, force: true }))

it('refuses a second owner and names the first', () => {
  const release = lockFolder(folder)
  expect(() => lockFolder(folder)).toThrow(FolderTakenError)
  expect(() => lockFolder(folder)).toThrow(new RegExp(`process ${process.pid}`))
  release()
  lockFolder(folder)()
})

it('takes over the lock of a dead process', () => {
  const dead = spawnSync(process.execPath, ['-e', '']).pid
  writeFileSync(join(folder, 'owner.json'), JSON.stringify({ pid: dead, startedAt: '1', command: 'holdtime' }))
  lockFolder(folder)
  expect(JSON.parse(readFileSync(join(folder, 'owner.json'), 'utf8'))).toMatchObject({ pid: process.pid })
})

it('takes over when the pid now belongs to another process', () => {
  writeFileSync(join(folder, 'owner.json'), JSON.stringify({ pid: process.pid, startedAt: '1', command: 'holdtime' }))
  lockFolder(folder)
})

it('takes over a half-written lock', () => {
  writeFileSync(join(folder, 'owner.json'), '{"pid":')
  lockFolder(folder)
})
