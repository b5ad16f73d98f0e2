// `npm test`: installs what it needs, then runs lint, types, and every test; ends with the true totals.
import { spawnSync } from 'node:child_process'
import { existsSync, mkdtempSync, readFileSync, readdirSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { build, checkNode, eslint, install, installDebianPackages, mustRun, nuxt, run, step, vitest } from './lib/steps.mjs'

const python = module => () => spawnSync('/usr/bin/python3', ['-c', `import ${module}`], { stdio: 'ignore' }).status === 0
const DEBIAN = [
  { name: 'chromium', probe: () => existsSync('/usr/bin/chromium') },
  { name: 'postgresql', probe: () => existsSync('/usr/lib/postgresql') && readdirSync('/usr/lib/postgresql').length > 0 },
  { name: 'poppler-utils', probe: () => existsSync('/usr/bin/pdftotext') },
  { name: 'python3-numpy', probe: python('numpy') },
  { name: 'python3-scipy', probe: python('scipy') },
]
const BEFORE_BUILD = ['unit', 'property', 'reference', 'database', 'fakes', 'components']
const ON_THE_BUILD = ['api', 'e2e']

checkNode()
await install()
await installDebianPackages(DEBIAN)
await step('prepare types', () => mustRun(nuxt, ['prepare']))

const reports = mkdtempSync(join(tmpdir(), 'holdtime-test-'))
const failedSteps = []
const check = async (title, command, args) => {
  const code = await step(title, () => run(command, args))
  if (code !== 0) failedSteps.push(title)
}
const test = (name, projects) => check(`test: ${projects.join(', ')}`, vitest,
  ['run', ...projects.map(project => `--project=${project}`), '--reporter=default', '--reporter=json', `--outputFile.json=${join(reports, `${name}.json`)}`])

await check('lint', eslint, ['.'])
await check('types', nuxt, ['typecheck'])
await test('before-build', BEFORE_BUILD)
await build()
await test('on-the-build', ON_THE_BUILD)

const total = { passed: 0, failed: 0, skipped: 0 }
for (const name of ['before-build', 'on-the-build']) {
  const file = join(reports, `${name}.json`)
  if (!existsSync(file)) continue
  const report = JSON.parse(readFileSync(file, 'utf8'))
  total.passed += report.numPassedTests
  total.failed += report.numFailedTests
  total.skipped += report.numPendingTests + report.numTodoTests
}
rmSync(reports, { recursive: true, force: true })
if (failedSteps.length > 0) process.stdout.write(`\n✗ failed: ${failedSteps.join('; ')}\n`)
process.stdout.write(`\n${total.passed} passed, ${total.failed} failed, ${total.skipped} skipped\n`)
process.exit(failedSteps.length > 0 || total.passed === 0 ? 1 : 0)
