import { describe, expect, it } from 'vitest'
import { csvCell, toCsv } from '#shared/utils/csv'
import { parseQuantity } from '#shared/utils/parse-quantity'
import { parseDay, parseTimeOfDay } from '#shared/utils/parse-wall-time'
import { CONNECTION_LOST, refusalSentence, refusedFields, SESSION_ENDED } from '#shared/utils/refusal-words'

describe('a number as it is typed', () => {
  it.each([['4.2', 4.2], ['4,2', 4.2], [' 1\u2009250 ', 1250], ['\u22123', -3], ['-0,5', -0.5], ['.5', 0.5], ['1e-3', 0.001], ['12.', 12]])('reads %j', (typed, number) => {
    expect(parseQuantity(typed)).toBe(number)
  })
  it.each(['abc', '1,2,3', '1.234,5', '4 K', '0x10', 'Infinity', '1e999', '--1'])('does not take %j', (typed) => {
    expect(parseQuantity(typed)).toBeUndefined()
  })
  it('tells an empty field from a wrong one', () => {
    expect(parseQuantity('  ')).toBeNull()
  })
})

describe('a day and a time as they are typed', () => {
  it.each([['2027-05-04', '2027-05-04'], ['2027-5-4', '2027-05-04'], ['2027/5/4', '2027-05-04'], ['4.5.2027', '2027-05-04'], ['4. 5. 2027', '2027-05-04'], ['2028-02-29', '2028-02-29']])('reads the day %j', (typed, day) => {
    expect(parseDay(typed)).toBe(day)
  })
  it.each(['2027-02-29', '2027-13-01', '5/4/2027', '04.05.27', 'today', '2027-05'])('does not take %j', (typed) => {
    expect(parseDay(typed)).toBeUndefined()
  })
  it.each([['09:30', '09:30'], ['9:30', '09:30'], ['9.30', '09:30'], ['0930', '09:30'], ['23:59', '23:59']])('reads the time %j', (typed, time) => {
    expect(parseTimeOfDay(typed)).toBe(time)
  })
  it.each(['24:00', '9:60', '930', '9', 'noon'])('does not take %j', (typed) => {
    expect(parseTimeOfDay(typed)).toBeUndefined()
  })
})

describe('a CSV', () => {
  // The characters are those of OWASP ASVS 5.0, 1.2.10.
  it.each(['=1+1', '+1', '-1', '@SUM(A1)', '\tx', '\rx', '\0x'])('keeps a spreadsheet from running %j', (text) => {
    expect(csvCell(text).replace(/^"/, '').startsWith('\'')).toBe(true)
  })
  it('leaves negative numbers numbers', () => {
    expect(csvCell(-4.2)).toBe('-4.2')
  })
  it('quotes what would break the row, by RFC 4180', () => {
    expect(toCsv(['a', 'b'], [['x, y', 'say "cold"'], [null, 2]])).toBe('a,b\r\n"x, y","say ""cold"""\r\n,2\r\n')
  })
})

describe('the words of a refusal', () => {
  it('tells no answer, an ended session and the server’s own sentence apart', () => {
    expect(refusalSentence(undefined)).toBe(CONNECTION_LOST)
    expect(refusalSentence(401, { message: 'Unauthorized' })).toBe(SESSION_ENDED)
    expect(refusalSentence(409, { message: 'Another run holds these days. Choose other days.' })).toBe('Another run holds these days. Choose other days.')
    expect(refusalSentence(500, {})).toMatch(/Try again/)
  })
  it('puts each issue at its field and leaves those of the whole out', () => {
    expect(refusedFields({ data: { issues: [{ path: ['lines', 0, 'litres'], message: 'Enter litres.' }, { path: [], message: 'No.' }] } })).toEqual({ 'lines.0.litres': 'Enter litres.' })
  })
})
