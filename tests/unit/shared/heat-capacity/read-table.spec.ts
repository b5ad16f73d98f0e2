import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { applyMapping, mappingFromHeads } from '#shared/heat-capacity/apply-mapping'
import { createTableReader, readTable } from '#shared/heat-capacity/read-table'

const COPPER = { molarMassGPerMol: 63.546, atomsPerFormulaUnit: 1, massMg: 412.6 }
const HEAD = 'T (K),C (mJ/(mol K)),sigma C (mJ/(mol K))'
const PLAIN = `${HEAD}\n2,1.77,0.02\n3,3.37,0.03\n4,5.82,0.05\n`

function curveOf(content: string | Uint8Array, restored: number[] = []) {
  const table = readTable(content)
  return applyMapping(table, mappingFromHeads(table), COPPER, restored)
}

const EXPECTED = { temperatureK: [2, 3, 4], heatCapacity: [1.77, 3.37, 5.82], sigma: [0.02, 0.03, 0.05] }
const utf8 = (text: string) => new TextEncoder().encode(text)
const utf16 = (text: string, little: boolean) => {
  const bytes = new Uint8Array(2 * text.length + 2)
  const view = new DataView(bytes.buffer)
  for (const [index, code] of [0xfeff, ...Array.from({ length: text.length }, (_, at) => text.charCodeAt(at))].entries()) view.setUint16(2 * index, code, little)
  return bytes
}

describe('a table in many dresses', () => {
  it.each<[string, string | Uint8Array]>([
    ['plain', PLAIN],
    ['bytes', utf8(PLAIN)],
    ['byte-order mark', `\uFEFF${PLAIN}`],
    ['byte-order mark as bytes', utf8(`\uFEFF${PLAIN}`)],
    ['UTF-16 little-endian', utf16(PLAIN, true)],
    ['UTF-16 big-endian', utf16(PLAIN, false)],
    ['CRLF', PLAIN.replaceAll('\n', '\r\n')],
    ['CR alone', PLAIN.replaceAll('\n', '\r')],
    ['no last line end', PLAIN.trimEnd()],
    ['semicolons and decimal commas', PLAIN.replaceAll(',', ';').replaceAll('.', ',')],
    ['tabs', PLAIN.replaceAll(',', '\t')],
    ['tabs and decimal commas', PLAIN.replaceAll(',', '\t').replaceAll('.', ',')],
    ['blanks', 'T/K   C/(mJ/(mol K))   σ(C)/(mJ/(mol K))\n 2  1.77 0.02\n 3  3.37 0.03\n 4 5.82  0.05\n'],
    ['blanks under a head without any', 'T_K C_mJ_per_mol_K sigma_C_mJ_per_mol_K\n2 1.77 0.02\n3 3.37 0.03\n4 5.82 0.05\n'],
    ['comments and blank rows', `# made by hand\n\n${PLAIN.replace('\n3', '\n\n# warmer now\n,,\n3')}\n\n`],
    ['head in a comment', `# ${PLAIN}`],
    ['quoted cells', PLAIN.replace('2,1.77', '"2","1.77"').replace('T (K)', '"T (K)"')],
    ['quoted head with a line end', PLAIN.replace('T (K)', '"Temperature\n(K)"')],
    ['unsorted', `${HEAD}\n4,5.82,0.05\n2,1.77,0.02\n3,3.37,0.03\n`],
    ['a line of units', 'T,C,sigma C\nK,mJ/(mol K),mJ/(mol K)\n2,1.77,0.02\n3,3.37,0.03\n4,5.82,0.05\n'],
    ['lines above the head', `Sample,Cu\nOperator,somebody\n${PLAIN}`],
    ['delimiters at the ends', PLAIN.replaceAll('\n', ',\n')],
    ['Fortran exponents and a true minus', `${HEAD}\n2,1.77D0,2D−2\n3,3.37d+00,3E-2\n4,582e−2,0.05\n`],
    ['mK and J', 'T/mK,C/(J/(mol K)),σ(C)/(mJ/(mol K))\n2000,0.00177,0.02\n3000,0.00337,0.03\n4000,0.00582,0.05\n'],
    ['other columns between', 'time_s;T/K;Field (Oe);C/(mJ/(mol K));σ(C)/(mJ/(mol K));note\n1;2;0;1.77;0.02;a\n2;3;0;3.37;0.03;b\n3;4;0;5.82;0.05;\n'],
  ])('%s', (_, content) => {
    const { curve, rejectedRows } = curveOf(content)
    expect(rejectedRows).toEqual([])
    expect(curve.temperatureK).toEqual(EXPECTED.temperatureK)
    curve.heatCapacity.forEach((value, index) => expect(value).toBeCloseTo(EXPECTED.heatCapacity[index]!, 12))
    curve.sigma!.forEach((value, index) => expect(value).toBeCloseTo(EXPECTED.sigma[index]!, 12))
  })

  it('reads the µ of an old instrument', () => {
    const bytes = utf8('T/K,C/(#J/K)\n2,11.5\n3,21.9\n').map(byte => byte === 0x23 ? 0xb5 : byte)
    expect(readTable(bytes).suggestedMapping.heatCapacity).toEqual({ column: 1, unit: 'µJ/K' })
  })

  it('takes σ in per cent', () => {
    const { curve } = curveOf('T/K,C/(mJ/(mol K)),σ(C)/%\n2,1.77,1\n3,3.37,2\n')
    expect(curve.sigma).toEqual([1.77 / 100, 3.37 * 2 / 100])
  })

  it('keeps the lines of the file while sorting', () => {
    expect(curveOf(`# a\n\n${HEAD}\n4,5.82,0.05\n2,1.77,0.02\n`).curve.rowNumbers).toEqual([5, 4])
    expect(curveOf(PLAIN.replace('T (K)', '"Temperature\n(K)"')).curve.rowNumbers).toEqual([3, 4, 5])
  })
})

describe('rows that cannot stand', () => {
  const spoiled = `${HEAD}\n2,NaN,0.02\n-3,3.37,0.03\n4,,0.05\n5,9.4,0\n6,-0.1,0.2\n7,21,0.2,9\n8\n9,warm,0.3\n10,55,0.5\n`

  it('are named with row, column and reason', () => {
    const { rejectedRows, curve } = curveOf(spoiled)
    expect(curve.temperatureK).toEqual([10])
    expect(rejectedRows.map(({ row, column, reason }) => [row, column, reason])).toEqual([
      [2, 'C (mJ/(mol K))', '“NaN” is no number.'],
      [3, 'T (K)', 'The temperature -3 is not above 0 K.'],
      [4, 'C (mJ/(mol K))', 'The cell is empty.'],
      [5, 'sigma C (mJ/(mol K))', 'The uncertainty 0 is not above zero.'],
      [6, 'C (mJ/(mol K))', 'The heat capacity -0.1 is not above zero.'],
      [7, undefined, 'The row has 4 cells where the table has 3 columns.'],
      [8, undefined, 'The row has 1 cell where the table has 3 columns.'],
      [9, 'C (mJ/(mol K))', '“warm” is no number.'],
    ])
  })

  it('come back only where they hold numbers', () => {
    const { rejectedRows, curve } = curveOf(spoiled, [2, 3, 6, 7])
    expect(curve.temperatureK).toEqual([6, 7, 10])
    expect(curve.heatCapacity[0]).toBe(-0.1)
    expect(rejectedRows.filter(row => row.restored).map(row => row.row)).toEqual([6, 7])
    expect(rejectedRows.filter(row => row.restorable).map(row => row.row)).toEqual([6, 7])
  })

  it('keeps repeats and notes them', () => {
    const { repeats, curve } = curveOf(`${HEAD}\n2,1.77,0.02\n3,3.37,0.03\n2,1.78,0.02\n2,1.76,0.02\n`)
    expect(curve.temperatureK).toEqual([2, 2, 2, 3])
    expect(repeats).toEqual([{ temperatureK: 2, rows: [2, 4, 5] }])
  })
})

describe('what is no table', () => {
  it.each<[string, string | Uint8Array, RegExp]>([
    ['an empty file', '', /empty/],
    ['blank lines', '\n\n  \n', /no rows/],
    ['only comments', '# nothing\n# here\n', /no rows/],
    ['a letter', 'Dear Sir,\nthe cryostat is cold.\nYours', /no table/],
    ['one column', 'T/K\n1\n2\n3\n', /no table/],
    ['binary', Uint8Array.from([1, 0, 2, 0xff, 0]), /binary/],
    ['a packed spreadsheet', Uint8Array.from([0x50, 0x4b, 3, 4, 9]), /Save the sheet as CSV/],
    ['commas for both', 'T/K,C/(mJ/(mol K))\n1,83,0,143\n1,90,0,133\n', /semicolons, or with decimal points/],
    ['an endless line', '1,'.repeat(80_000), /longer than/],
    ['too many columns', `${Array.from({ length: 101 }, (_, index) => index).join(',')}\n`, /at most 100/],
  ])('%s is refused with a sentence', (_, content, sentence) => {
    expect(() => readTable(content)).toThrowError(sentence)
  })

  it('refuses a file without heads, or without units, naming what is missing', () => {
    const bare = readTable('2,1.77\n3,3.37\n')
    expect(bare.heads).toEqual(['Column 1', 'Column 2'])
    expect(() => mappingFromHeads(bare)).toThrowError(/has no heads/)
    expect(() => mappingFromHeads(readTable('T,C\n2,1.77\n3,3.4\n'))).toThrowError(/“T” says no unit/)
    expect(() => mappingFromHeads(readTable('T/K,p/mbar\n2,1.77\n3,3.4\n'))).toThrowError(/No column is headed as a heat capacity/)
  })

  it('refuses when no row can be used, and a column that is not there', () => {
    expect(() => curveOf(`${HEAD}\n2,0,0.1\n3,-1,0.2\n`)).toThrowError(/No row of the table can be used\. The first, row 2/)
    const table = readTable(PLAIN)
    expect(() => applyMapping(table, { ...mappingFromHeads(table), heatCapacity: { column: 7, unit: 'J/K' } }, COPPER)).toThrowError(/no column 8/)
  })
})

describe('a table in pieces', () => {
  it('is the same however it is cut', () => {
    const bytes = utf8(`\uFEFF# µ-calorimeter\r\n"T/K";C/(µJ/K)\r\n${Array.from({ length: 30 }, (_, index) => `${index + 1},5;${index * 3},25`).join('\r\n')}\r\n`)
    const whole = readTable(bytes)
    expect(whole.rowCount).toBe(30)
    fc.assert(fc.property(fc.array(fc.integer({ min: 1, max: bytes.length - 1 }), { maxLength: 8 }), (cuts) => {
      const reader = createTableReader()
      const edges = [0, ...cuts.sort((a, b) => a - b), bytes.length]
      edges.slice(1).forEach((end, index) => {
        if (end > edges[index]!) reader.push(bytes.subarray(edges[index], end))
      })
      expect(reader.finish()).toEqual(whole)
    }))
  })

  it('tells how far it is', () => {
    const reader = createTableReader()
    reader.push(`${HEAD}\n${'2,1.77,0.02\n'.repeat(1000)}`)
    expect(reader.progress().rows).toBe(1000)
    expect(reader.progress().bytes).toBe(HEAD.length + 1 + 12_000)
    expect(reader.finish().rowCount).toBe(1000)
  })

  it('stops at the limit of rows with the line', () => {
    const reader = createTableReader()
    const block = '2,1.77,0.02\n'.repeat(100_000)
    reader.push(`${HEAD}\n`)
    expect(() => {
      for (let piece = 0; piece < 6; piece += 1) reader.push(block)
    }).toThrowError(/more than 500000 rows/)
  })

  it('never throws anything but a sentence on noise', () => {
    fc.assert(fc.property(fc.uint8Array({ maxLength: 400 }), (bytes) => {
      try {
        readTable(bytes)
      }
      catch (error) {
        expect((error as Error).name).toBe('DomainError')
      }
    }), { numRuns: 500 })
  })
})
