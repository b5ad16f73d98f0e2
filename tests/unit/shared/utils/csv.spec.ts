import { describe, expect, it } from 'vitest'
import { csvCell, toCsv } from '#shared/utils/csv'

describe('a cell of a CSV', () => {
  // OWASP ASVS 5.0, 1.2.10: text that begins with =, +, -, @, tab or NUL is run by a spreadsheet.
  it.each([
    ['=1+1', '\'=1+1'], ['+47 5555', '\'+47 5555'], ['-4.2', '\'-4.2'], ['@name', '\'@name'], ['\0x', '\'\0x'],
    ['\t=1', '"\'\t=1"'], ['\r=1', '"\'\r=1"'], ['\n=1', '"\'\n=1"'],
    ['=HYPERLINK("http://x","y")', '"\'=HYPERLINK(""http://x"",""y"")"'],
  ])('guards the text %j as %j', (text, cell) => {
    expect(csvCell(text)).toBe(cell)
  })

  it.each([
    [-4.2, '-4.2'], [0, '0'], [-0, '0'], [1e-7, '1e-7'], [2310, '2310'], [0.1 + 0.2, '0.30000000000000004'],
    [Number.NaN, ''], [Infinity, ''], [null, ''], [undefined, ''], [true, 'true'], [false, 'false'],
  ])('leaves %j a value: %j', (value, cell) => {
    expect(csvCell(value)).toBe(cell)
  })

  it.each([
    ['plain', 'plain'], ['Al2O3', 'Al2O3'], ['a=b', 'a=b'], ['', ''], ['\u22124.2', '\u22124.2'],
    ['a,b', '"a,b"'], ['say "cold"', '"say ""cold"""'], ['two\nlines', '"two\nlines"'],
    // Split at semicolons or tabs, the rest would be a formula of its own.
    ['a;=1+1', '"a;=1+1"'], ['a\t=1+1', '"a\t=1+1"'],
  ])('writes the text %j as %j', (text, cell) => {
    expect(csvCell(text)).toBe(cell)
  })
})

describe('a table as CSV', () => {
  it('has a head, and ends each row by CR LF (RFC 4180, section 2)', () => {
    expect(toCsv(['T/K', 'C/(mJ/(mol K))'], [[1.5, -0.25], [null, '=x']])).toBe('T/K,C/(mJ/(mol K))\r\n1.5,-0.25\r\n,\'=x\r\n')
    expect(toCsv(['a'], [])).toBe('a\r\n')
  })
})
