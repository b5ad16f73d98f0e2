import { mkdirSync, openSync, readFileSync, rmSync, writeSync, closeSync } from 'node:fs'
import { join } from 'node:path'

/** Who owns a data folder: the process and when it started, so that a reused pid is not mistaken for the owner. */
interface Owner { pid: number, startedAt: string, command: string }

/** The data folder belongs to another living process. */
export class FolderTakenError extends Error {
  constructor(folder: string, owner: Owner) {
    super(`The data folder ${folder} is in use by process ${owner.pid} (${owner.command}). Stop that process first, or give this one another folder with HOLDTIME_DATA.`)
    this.name = 'FolderTakenError'
  }
}

/**
 * Takes the data folder for this process. Two processes on one PGlite folder destroy it without an error, so
 * a second is refused; the lock of a dead process is taken over.
 *
 * @param folder the data folder, made when missing
 * @returns releases the lock
 * @throws FolderTakenError naming the living owner
 */
export function lockFolder(folder: string): () => void {
  mkdirSync(folder, { recursive: true })
  const file = join(folder, 'owner.json')
  const mine: Owner = { pid: process.pid, startedAt: startOf(process.pid) ?? '', command: process.argv.slice(1, 2).join(' ') || 'node' }
  for (let attempt = 0; attempt < 5; attempt += 1) {
    try {
      const handle = openSync(file, 'wx')
      writeSync(handle, JSON.stringify(mine))
      closeSync(handle)
      return () => rmSync(file, { force: true })
    }
    catch (error) {
      if ((error as NodeJS.ErrnoException).code !== 'EEXIST') throw error
      const owner = readOwner(file)
      if (owner && isAlive(owner)) throw new FolderTakenError(folder, owner)
      rmSync(file, { force: true })
    }
  }
  throw new Error(`The data folder ${folder} could not be locked; several processes are starting on it. Try again.`)
}

function readOwner(file: string): Owner | null {
  try {
    return JSON.parse(readFileSync(file, 'utf8')) as Owner
  }
  catch {
    // Half-written by a process that died, or gone meanwhile: nobody owns it.
    return null
  }
}

function isAlive(owner: Owner): boolean {
  try {
    process.kill(owner.pid, 0)
  }
  catch (error) {
    if ((error as NodeJS.ErrnoException).code === 'ESRCH') return false
  }
  const startedAt = startOf(owner.pid)
  return startedAt === null || owner.startedAt === '' || startedAt === owner.startedAt
}

/** Start time of a process in clock ticks since boot, from Linux's /proc; null where there is none. */
function startOf(pid: number): string | null {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, 'utf8')
    return stat.slice(stat.lastIndexOf(')') + 2).split(' ')[19] ?? null
  }
  catch {
    return null
  }
}
