// A spreadsheet runs a cell that begins with one of these as a formula.
const RUNS_AS_FORMULA = /^[=+\-@\t\r\n\0]/

/** One cell of a CSV: numbers stay numbers, text that a spreadsheet would run gets a leading apostrophe (OWASP ASVS 5.0, 1.2.10). */
export function csvCell(value: string | number | boolean | null | undefined): string {
  if (value === null || value === undefined) return ''
  if (typeof value === 'number') return Number.isFinite(value) ? String(value) : ''
  const text = String(value)
  const guarded = RUNS_AS_FORMULA.test(text) ? `'${text}` : text
  // Quoted also for a semicolon or tab: where a spreadsheet splits at those, what follows must not become a cell of its own.
  return /[",;\t\r\n]/.test(guarded) ? `"${guarded.replaceAll('"', '""')}"` : guarded
}

/** A table as CSV by RFC 4180. */
export function toCsv(heads: readonly string[], rows: readonly (readonly (string | number | boolean | null | undefined)[])[]): string {
  return `${[heads, ...rows].map(row => row.map(csvCell).join(',')).join('\r\n')}\r\n`
}
