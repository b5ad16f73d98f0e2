import { createReadStream } from 'node:fs'
import { resolve } from 'node:path'
import { parseArgs } from 'node:util'
import { DomainError } from '#shared/errors'
import { checkTable } from '#shared/heat-capacity/check-table'
import type { Table } from '#shared/heat-capacity/read-table'
import { createTableReader } from '#shared/heat-capacity/read-table'
import type { HeatCapacityReport } from '#shared/heat-capacity/report-json'
import { parseMass } from '#shared/heat-capacity/sample'
import { analysisSampleSchema, fitModelSchema } from '#shared/schemas/heat-capacity'
import { formatUncertainty } from '#shared/utils/format-uncertainty'

const USAGE = `npm run check-heat-capacity -- FILE.csv --formula Cu [options]

  --formula Cu            chemical formula (needed)
  --kind metal            metal, superconductor, insulator or unknown; unknown when left out
  --mass 412.6mg          mass of the sample, needed for tables in J/K; 412.6(2)mg states its uncertainty
  --density 8.96          g/cm³, needed for tables per volume
  --electrons 1           conduction electrons per formula unit
  --tc 9.2                critical temperature of a superconductor, K
  --addenda FILE.csv      heat capacity of everything but the sample, subtracted
  --window 1.5:7          lowest and highest temperature of the fit, K; chosen and explained when left out
  --model gamma+beta3     terms of gamma, beta3, beta5, tail
  --json                  print JSON

Columns and units are read from the heads: “T/K,C/(mJ/(mol K))” or “T (K),C (mJ/(mol K))”.
Exit code: 0 ok or caution, 1 fail, 2 input that cannot be read.`

const OPTIONS = {
  formula: { type: 'string' }, kind: { type: 'string', default: 'unknown' }, mass: { type: 'string' }, density: { type: 'string' }, electrons: { type: 'string' }, tc: { type: 'string' },
  addenda: { type: 'string' }, window: { type: 'string' }, model: { type: 'string' }, json: { type: 'boolean', default: false }, help: { type: 'boolean', short: 'h', default: false },
} as const

/** Reads a table as a stream, so that its size in memory is that of its numbers. Paths are those of the folder npm was called in. */
async function readFile(path: string): Promise<Table> {
  const reader = createTableReader()
  try {
    for await (const chunk of createReadStream(resolve(process.env.INIT_CWD ?? '.', path), { highWaterMark: 1 << 20 })) reader.push(chunk as Uint8Array)
  }
  catch (error) {
    if (error instanceof DomainError) throw new DomainError(error.code, `${path}: ${error.message}`, error.path)
    const code = (error as NodeJS.ErrnoException).code
    throw new DomainError('invalid', code === 'ENOENT' ? `There is no file ${path}. Check the path.` : `${path} cannot be read (${code}). Check that it is a file you may read.`, ['file'])
  }
  return reader.finish()
}

/** A number given on the command line. */
function numberOf(text: string | undefined, flag: string): number | undefined {
  if (text === undefined) return undefined
  const value = Number(text.replace(',', '.'))
  if (text.trim() === '' || !Number.isFinite(value)) throw new DomainError('invalid', `“${text}” is no number for --${flag}.`, [flag])
  return value
}

function windowOf(text: string | undefined): [number, number] | undefined {
  if (text === undefined) return undefined
  const parts = text.split(':')
  const [low, high] = parts.map(part => numberOf(part, 'window'))
  if (parts.length !== 2) throw new DomainError('invalid', `“${text}” is no window. Write the lowest and the highest temperature in K, such as 1.5:7.`, ['window'])
  return [low!, high!]
}

/** Parses with a schema; its first complaint becomes the sentence. */
function checked<T>(schema: { safeParse: (value: unknown) => { success: true, data: T } | { success: false, error: { issues: { message: string, path: (string | number)[] }[] } } }, value: unknown): T {
  const result = schema.safeParse(value)
  if (result.success) return result.data
  const issue = result.error.issues[0]!
  throw new DomainError('invalid', issue.message, issue.path)
}

async function check(values: ReturnType<typeof parse>['values'], files: string[]): Promise<HeatCapacityReport> {
  const [file, ...more] = files
  if (!file) throw new DomainError('invalid', 'Name the file with the measured table. --help shows how.', ['file'])
  if (more.length > 0) throw new DomainError('invalid', `One file at a time: ${more.join(', ')} is one too many.`, ['file'])
  if (values.formula === undefined) throw new DomainError('invalid', 'Name the chemical formula of the sample with --formula.', ['formula'])
  const mass = values.mass === undefined ? {} : parseMass(values.mass)
  const sample = checked(analysisSampleSchema, {
    formula: values.formula, kind: values.kind, ...mass, densityGPerCm3: numberOf(values.density, 'density'), conductionElectrons: numberOf(values.electrons, 'electrons'), criticalTemperatureK: numberOf(values.tc, 'tc'),
  })
  const terms = values.model === undefined ? undefined : checked(fitModelSchema.shape.terms, values.model.split('+').map(term => term.trim()))
  const window = windowOf(values.window)
  const windowK = window && checked(fitModelSchema.shape.windowK, window)
  const addenda = values.addenda === undefined ? undefined : { table: await readFile(values.addenda) }
  return checkTable({ table: { table: await readFile(file) }, sample, terms, windowK, addenda })
}

/** The report for people. */
function readable(report: HeatCapacityReport): string {
  const { fit, window } = report
  const line = (name: string, estimate: HeatCapacityReport['fit']['gamma']) => estimate ? [`  ${name.padEnd(4)} ${formatUncertainty(estimate.value, estimate.standardError).compact} ${estimate.unit}`] : []
  const marks = { 'ok': 'ok      ', 'caution': 'caution ', 'fail': 'FAIL    ', 'not-applicable': '–       ' }
  return [
    `${report.sample.formula}, ${report.sample.molarMass.value.toFixed(3)} g/mol, ${report.sample.kind}`,
    `Window ${Number(window.low.toPrecision(5))} K to ${Number(window.high.toPrecision(5))} K, ${fit.pointCount} points, ν = ${fit.degreesOfFreedom}, χ²/ν = ${fit.reducedChiSquared.toPrecision(3)}, ${fit.weights} weights, ${fit.errorConvention} errors`,
    ...(window.reason ? [`  ${window.reason}`] : []),
    ...line('γ', fit.gamma), ...line('β₃', fit.beta3), ...line('β₅', fit.beta5), ...line('A', fit.tail), ...line('Θ_D', fit.debyeTemperature),
    '',
    ...report.checks.map(each => `${marks[each.status]}${each.id.padEnd(16)} ${each.message}`),
    ...(report.rejectedRows.length > 0 ? ['', `Rows left out: ${report.rejectedRows.length}`, ...report.rejectedRows.slice(0, 10).map(row => `  row ${row.row}${row.column ? `, ${row.column}` : ''}: ${row.reason}`)] : []),
    ...report.suggestions.map(suggestion => `\nSuggestion: ${suggestion.message}`),
    '',
    `Verdict: ${report.verdict}`,
  ].join('\n')
}

function parse(args: string[]) {
  return parseArgs({ args, options: OPTIONS, allowPositionals: true, strict: true })
}

async function main(args: string[]): Promise<number> {
  const asJson = args.includes('--json')
  try {
    const { values, positionals } = parse(args)
    if (values.help) {
      process.stdout.write(`${USAGE}\n`)
      return 0
    }
    const report = await check(values, positionals)
    process.stdout.write(`${asJson ? JSON.stringify(report, null, 2) : readable(report)}\n`)
    return report.verdict === 'fail' ? 1 : 0
  }
  catch (error) {
    const known = error instanceof DomainError || (error as NodeJS.ErrnoException).code?.startsWith('ERR_PARSE_ARGS')
    if (!known) throw error
    const { message } = error as Error
    if (asJson) process.stdout.write(`${JSON.stringify({ error: { message, path: error instanceof DomainError ? error.path : [] } }, null, 2)}\n`)
    process.stderr.write(`${message}\n`)
    return 2
  }
}

process.exitCode = await main(process.argv.slice(2))
