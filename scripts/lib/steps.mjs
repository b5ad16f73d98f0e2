// What `npm run demo` and `npm test` share. Plain JavaScript on Node's own modules: it runs before anything is installed.
import { spawn, spawnSync } from 'node:child_process'
import { createHash } from 'node:crypto'
import { existsSync, mkdirSync, readFileSync, readdirSync, statSync, writeFileSync } from 'node:fs'
import { createServer } from 'node:net'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'

export const root = fileURLToPath(new URL('../..', import.meta.url))
const bin = name => join(root, 'node_modules', '.bin', name)
export const tsx = ['--import', join(root, 'node_modules/tsx/dist/esm/index.mjs')]
export const tsxEnvironment = { TSX_TSCONFIG_PATH: join(root, 'scripts/tsconfig.json') }

/** Says what is being done, and how long it took. */
export async function step(title, work) {
  const start = Date.now()
  process.stdout.write(`▸ ${title}\n`)
  const result = await work()
  process.stdout.write(`  ${title}: ${((Date.now() - start) / 1000).toFixed(1)} s\n`)
  return result
}

/** Runs a program to its end; its output is shown. Resolves with its exit code. */
export function run(command, args, options = {}) {
  return new Promise((resolve, reject) => {
    const child = spawn(command, args, { cwd: root, stdio: 'inherit', ...options, env: { ...process.env, NUXT_TELEMETRY_DISABLED: '1', ...options.env } })
    child.once('error', reject)
    child.once('exit', code => resolve(code ?? 1))
  })
}

/** Runs a program and ends this one with a clear sentence when it fails. */
export async function mustRun(command, args, options = {}) {
  const code = await run(command, args, options)
  if (code !== 0) fail(`\`${[command.split('/').pop(), ...args].join(' ')}\` ended with code ${code}; see its output above.`)
}

export function fail(sentence) {
  process.stderr.write(`\n✗ ${sentence}\n`)
  process.exit(1)
}

export function checkNode() {
  const [major, minor] = process.versions.node.split('.').map(Number)
  if (major !== 20 || minor < 19) fail(`Holdtime runs on Node 20.19 or later of the 20 line; this is ${process.version}. See .nvmrc.`)
}

/** Installs the pinned packages when the lock file is newer than what is installed. */
export async function install() {
  const marker = join(root, 'node_modules/.holdtime-installed')
  const wanted = hashOf(['package.json', 'package-lock.json'])
  if (existsSync(marker) && readFileSync(marker, 'utf8') === wanted) return
  await step('install the pinned packages', () => mustRun('npm', ['ci', '--no-progress', '--loglevel=error']))
  writeFileSync(marker, wanted)
}

/** Builds the production server when a source is newer than the last build. */
export async function build() {
  const marker = join(root, '.output/holdtime-built')
  const wanted = hashOf(['app.vue', 'error.vue', 'layouts', 'pages', 'components', 'composables', 'stores', 'server', 'middleware', 'plugins', 'utils', 'shared', 'assets', 'public', 'drizzle', 'types', 'nuxt.config.ts', 'tailwind.config.ts', 'package-lock.json'])
  if (existsSync(marker) && readFileSync(marker, 'utf8') === wanted) return
  await step('build', () => mustRun(bin('nuxt'), ['build'], { env: { NODE_ENV: 'production' } }))
  mkdirSync(join(root, '.output'), { recursive: true })
  writeFileSync(marker, wanted)
}

/** SHA-256 over the contents of files and folders, so that a step is done again exactly when its inputs changed. */
export function hashOf(paths) {
  const hash = createHash('sha256')
  const visit = (path) => {
    if (!existsSync(path)) return
    if (statSync(path).isDirectory()) for (const name of readdirSync(path).sort()) visit(join(path, name))
    else hash.update(path.slice(root.length)).update(readFileSync(path))
  }
  for (const path of paths) visit(join(root, path))
  return hash.digest('hex')
}

/** Ends with a clear sentence when another program listens on the port. */
export async function mustBeFree(port, name, variable) {
  const free = await new Promise((resolve) => {
    const server = createServer()
    server.once('error', () => resolve(false))
    server.listen(port, '127.0.0.1', () => server.close(() => resolve(true)))
  })
  if (!free) fail(`Port ${port} (${name}) is taken by another program. Stop it, or choose another port with ${variable}=… .`)
}

/** Installs Debian packages of which a program is missing; says so where that is not possible. */
export async function installDebianPackages(wanted) {
  const missing = wanted.filter(({ probe }) => !probe()).map(({ name }) => name)
  if (missing.length === 0) return
  const isRoot = process.getuid?.() === 0
  const hasSudo = spawnSync('sudo', ['-n', 'true'], { stdio: 'ignore' }).status === 0
  if (!isRoot && !hasSudo) fail(`The tests need Debian's ${missing.join(', ')}. Install them (apt-get install ${missing.join(' ')}) and run again.`)
  const prefix = isRoot ? [] : ['sudo', '-n']
  const apt = (...args) => {
    const [command, ...rest] = [...prefix, 'apt-get', ...args]
    return mustRun(command, rest, { env: { DEBIAN_FRONTEND: 'noninteractive' }, stdio: ['ignore', 'ignore', 'inherit'] })
  }
  await step(`install Debian's ${missing.join(', ')}`, async () => {
    await apt('update', '-q')
    await apt('install', '-y', '-q', '--no-install-recommends', ...missing)
  })
}

export const nuxt = bin('nuxt')
export const eslint = bin('eslint')
export const vitest = bin('vitest')
