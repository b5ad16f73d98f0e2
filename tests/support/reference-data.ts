import { readFileSync } from 'node:fs'

const DATA = new URL('../reference/data/', import.meta.url)

/** Reads a JSON file of `tests/reference/data`. */
export function referenceJson<T>(path: string): T {
  return JSON.parse(readFileSync(new URL(path, DATA), 'utf8')) as T
}

/** Reads a comma-separated file of `tests/reference/data` as records by column head; quoted cells may hold commas. */
export function referenceTable(path: string): Record<string, string>[] {
  const lines = readFileSync(new URL(path, DATA), 'utf8').trim().split(/\r?\n/).map(splitRow)
  const heads = lines[0] ?? []
  return lines.slice(1).map(cells => Object.fromEntries(heads.map((head, column) => [head, cells[column] ?? ''])))
}

function splitRow(line: string): string[] {
  return [...line.matchAll(/("(?:[^"]|"")*"|[^,]*)(?:,|$)/g)].map(match => match[1]!.replace(/^"|"$/g, '').replaceAll('""', '"'))
}

/** Largest relative difference, safe where the expected number is zero. */
export function relativeDifference(actual: number, expected: number): number {
  return expected === 0 ? Math.abs(actual) : Math.abs(actual / expected - 1)
}
