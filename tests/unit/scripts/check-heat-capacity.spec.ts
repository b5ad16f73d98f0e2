import { spawnSync } from 'node:child_process'
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { HeatCapacityReport } from '#shared/heat-capacity/report-json'
import { copperLaw, measuredTable } from '../../support/heat-capacity-files'

const ROOT = fileURLToPath(new URL('../../../', import.meta.url))
let folder = ''
const file = (name: string) => join(folder, name)

beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'check-heat-capacity-'))
  const copper = { law: copperLaw, fromK: 1.3, toK: 7 }
  writeFileSync(file('copper.csv'), measuredTable(copper))
  writeFileSync(file('total.csv'), measuredTable({ ...copper, law: t => copperLaw(t) * 1.5, unit: 'µJ/K', factor: 412.6 / 63.546 }))
  writeFileSync(file('addenda.csv'), measuredTable({ ...copper, fromK: 1.2, toK: 7.5, law: t => copperLaw(t) * 0.5, unit: 'µJ/K', factor: 412.6 / 63.546, noise: 0.001 }))
  writeFileSync(file('thousand.csv'), measuredTable({ ...copper, unit: 'J/(mol K)' }))
  writeFileSync(file('letter.txt'), 'Dear Sir,\nit was cold.\n')
})
afterAll(() => rmSync(folder, { recursive: true, force: true }))

function run(...args: string[]) {
  const { status, stdout, stderr } = spawnSync(process.execPath, ['--import', 'tsx', 'scripts/check-heat-capacity.ts', ...args], { cwd: ROOT, encoding: 'utf8', env: { ...process.env, TSX_TSCONFIG_PATH: 'scripts/tsconfig.json', INIT_CWD: folder } })
  return { status, stdout, stderr }
}

const json = (stdout: string) => JSON.parse(stdout) as HeatCapacityReport

describe('npm run check-heat-capacity', { timeout: 60_000 }, () => {
  it('prints the promised JSON and ends with 0 for good copper', () => {
    const { status, stdout } = run('copper.csv', '--formula', 'Cu', '--kind', 'metal', '--electrons', '1', '--window', '1.2:6.8', '--json')
    const report = json(stdout)
    expect(status).toBe(0)
    for (const name of ['gamma', 'beta3', 'debyeTemperature'] as const) {
      expect(report.fit[name]).toEqual({ value: expect.any(Number), standardError: expect.any(Number), unit: expect.any(String) })
    }
    expect(report.fit.gamma!.value).toBeCloseTo(0.694, 1)
    expect(report.fit.debyeTemperature!.value / 344.5).toBeCloseTo(1, 1)
    expect(report.fit.pointCount - report.fit.degreesOfFreedom).toBe(2)
    expect(report.window).toMatchObject({ low: 1.2, high: 6.8, unit: 'K', chosenBy: 'given' })
    expect(report.checks).toHaveLength(15)
    for (const check of report.checks) expect(Object.keys(check)).toEqual(expect.arrayContaining(['id', 'status', 'message', 'value', 'band', 'source']))
    expect(report).toMatchObject({ verdict: 'ok', suggestions: [], rejectedRows: [] })
  })

  it('takes addenda off a table per whole sample', () => {
    const { status, stdout } = run('total.csv', '--formula', 'Cu', '--mass', '412.6mg', '--kind', 'metal', '--addenda', 'addenda.csv', '--model', 'gamma+beta3', '--window', '1.2:6.8', '--json')
    const report = json(stdout)
    expect(status).toBe(0)
    expect(report.fit.gamma!.value).toBeCloseTo(0.694, 1)
    expect(report.checks.find(check => check.id === 'addenda')!.value).toBeCloseTo(1 / 3, 2)
  })

  it('ends with 1 and names the slip for a factor of 1000', () => {
    const { status, stdout } = run('thousand.csv', '--formula', 'Cu', '--kind', 'metal', '--json')
    expect(status).toBe(1)
    expect(json(stdout).suggestions[0]).toMatchObject({ id: 'divide-by-1000', factor: 0.001 })
  })

  it('is readable without --json', () => {
    const { status, stdout } = run('copper.csv', '--formula', 'Cu', '--kind', 'metal')
    expect(status).toBe(0)
    expect(stdout).toMatch(/Θ_D\s+34\d/)
    expect(stdout).toMatch(/Verdict: ok/)
    expect(run('--help').stdout).toMatch(/Exit code/)
  })

  it.each([
    ['no such file', ['absent.csv', '--formula', 'Cu'], /There is no file absent\.csv/],
    ['a folder', ['.', '--formula', 'Cu'], /cannot be read/],
    ['no file', ['--formula', 'Cu'], /Name the file/],
    ['no formula', ['copper.csv'], /--formula/],
    ['a bad formula', ['copper.csv', '--formula', 'copper'], /no chemical formula/],
    ['a letter', ['letter.txt', '--formula', 'Cu'], /no table/],
    ['a mass without its unit', ['total.csv', '--formula', 'Cu', '--mass', '412.6'], /no mass/],
    ['no mass for J/K', ['total.csv', '--formula', 'Cu'], /mass is needed/],
    ['a bad kind', ['copper.csv', '--formula', 'Cu', '--kind', 'stone'], /kind of material/],
    ['a bad window', ['copper.csv', '--formula', 'Cu', '--window', '7'], /no window/],
    ['a window upside down', ['copper.csv', '--formula', 'Cu', '--window', '7:1'], /from a lower to a higher/],
    ['an empty window', ['copper.csv', '--formula', 'Cu', '--window', '50:60'], /No points lie/],
    ['an unknown term', ['copper.csv', '--formula', 'Cu', '--model', 'gamma+delta'], /gamma, beta3, beta5 and tail/],
    ['an unknown flag', ['copper.csv', '--formula', 'Cu', '--colour', 'red'], /colour/],
  ])('%s ends with 2 and a sentence', (_, args, sentence) => {
    const { status, stderr, stdout } = run(...args, '--json')
    expect(stderr).toMatch(sentence)
    expect(status).toBe(2)
    expect((JSON.parse(stdout) as { error: { message: string } }).error.message).toMatch(sentence)
    expect(stderr).not.toMatch(/^\s+at /m)
  })
})
