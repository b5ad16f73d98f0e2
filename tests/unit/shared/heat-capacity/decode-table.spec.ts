import { describe, expect, it } from 'vitest'
import { decodeTable } from '#shared/heat-capacity/decode-table'

const bytes = (...values: number[]) => Uint8Array.from(values)
const text = (value: string) => new TextEncoder().encode(value)

describe('decodeTable', () => {
  it('reads UTF-8 with and without a byte-order mark', () => {
    expect(decodeTable(text('T/K,C/(µJ/K)\n'))).toBe('T/K,C/(µJ/K)\n')
    expect(decodeTable(bytes(0xef, 0xbb, 0xbf, ...text('T/K\n1')))).toBe('T/K\n1')
  })

  it('reads UTF-16 of either order by its mark', () => {
    expect(decodeTable(bytes(0xff, 0xfe, 0x54, 0, 0x2f, 0, 0x4b, 0))).toBe('T/K')
    expect(decodeTable(bytes(0xfe, 0xff, 0, 0x54, 0, 0x2f, 0, 0x4b))).toBe('T/K')
  })

  it('reads the µ of Windows-1252, which is no valid UTF-8', () => {
    expect(decodeTable(bytes(...text('C/('), 0xb5, ...text('J/K)')))).toBe('C/(µJ/K)')
  })

  it.each([
    ['an empty file', bytes(), /empty/],
    ['blank lines', text(' \n\r\n\t'), /blank lines/],
    ['a packed spreadsheet', bytes(0x50, 0x4b, 3, 4, 20, 0), /Save the sheet as CSV/],
    ['a gzip', bytes(0x1f, 0x8b, 8), /Unpack/],
    ['a PDF', text('%PDF-1.7\n'), /PDF/],
    ['a picture', bytes(0x89, 0x50, 0x4e, 0x47, 13, 10), /picture/],
    ['other binary data', bytes(0x31, 0, 0x32, 0xff), /binary/],
  ])('refuses %s with what to do instead', (_, file, sentence) => {
    expect(() => decodeTable(file)).toThrow(sentence)
  })
})
