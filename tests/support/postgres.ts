import { execFileSync, spawn } from 'node:child_process'
import { randomUUID } from 'node:crypto'
import { chownSync, existsSync, mkdtempSync, readdirSync, rmSync } from 'node:fs'
import { createServer } from 'node:net'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import pg from 'pg'

/** A PostgreSQL server of the tests' own, from Debian's package, on loopback. */
export interface TestPostgres {
  /** URL of its maintenance database, from which others are made. */
  adminUrl: string
  stop(): Promise<void>
}

/** Makes an empty database on the server and gives its URL. */
export async function createDatabase(adminUrl: string): Promise<string> {
  const name = `holdtime_${randomUUID().replaceAll('-', '')}`
  const client = new pg.Client({ connectionString: adminUrl })
  await client.connect()
  await client.query(`create database ${name}`)
  await client.end()
  return adminUrl.replace(/\/postgres$/, `/${name}`)
}

/** A free loopback port. */
export function freePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const server = createServer()
    server.once('error', reject)
    server.listen(0, '127.0.0.1', () => {
      const address = server.address()
      server.close(() => typeof address === 'object' && address ? resolve(address.port) : reject(new Error('no port')))
    })
  })
}

/** Folder of the newest installed server's programs, or null where Debian's postgresql package is absent. */
export function findPostgresPrograms(): string | null {
  const root = '/usr/lib/postgresql'
  if (!existsSync(root)) return null
  const newest = readdirSync(root).map(Number).filter(version => version >= 15 && existsSync(`${root}/${version}/bin/initdb`)).sort((a, b) => b - a)[0]
  return newest ? `${root}/${newest}/bin` : null
}

/**
 * Starts a fresh server. PostgreSQL refuses to run as root, so there it runs as Debian's `postgres` user.
 *
 * @throws Error when the package is not installed
 */
export async function startPostgres(): Promise<TestPostgres> {
  const programs = findPostgresPrograms()
  if (!programs) throw new Error('PostgreSQL 15 or later is not installed; `npm test` installs Debian\'s postgresql package.')
  const folder = mkdtempSync(join(tmpdir(), 'holdtime-postgres-'))
  const owner = process.getuid?.() === 0
    ? { uid: Number(execFileSync('id', ['-u', 'postgres'], { encoding: 'utf8' })), gid: Number(execFileSync('id', ['-g', 'postgres'], { encoding: 'utf8' })) }
    : {}
  if ('uid' in owner && owner.uid !== undefined) chownSync(folder, owner.uid, owner.gid)
  const port = await freePort()
  execFileSync(join(programs, 'initdb'), ['-D', folder, '-U', 'holdtime', '--auth=trust', '--encoding=UTF8', '--no-sync'], { ...owner, stdio: 'ignore', cwd: folder })
  const server = spawn(join(programs, 'postgres'), ['-D', folder, '-h', '127.0.0.1', '-p', String(port), '-k', '', '-c', 'fsync=off', '-c', 'max_connections=100'], { ...owner, stdio: 'ignore', cwd: folder })
  const exited = new Promise<void>(resolve => server.once('exit', () => resolve()))
  const psql = (statement: string) => execFileSync(join(programs, 'psql'), ['-h', '127.0.0.1', '-p', String(port), '-U', 'holdtime', '-d', 'postgres', '-c', statement], { stdio: 'ignore', cwd: folder })
  await waitUntilReady(() => psql('select 1'))
  return {
    adminUrl: `postgres://holdtime@127.0.0.1:${port}/postgres`,
    stop: async () => {
      server.kill('SIGINT')
      await exited
      rmSync(folder, { recursive: true, force: true })
    },
  }
}

async function waitUntilReady(probe: () => void) {
  for (let attempt = 0; ; attempt += 1) {
    try {
      return probe()
    }
    catch (error) {
      if (attempt > 100) throw error
      await new Promise(resolve => setTimeout(resolve, 100))
    }
  }
}
