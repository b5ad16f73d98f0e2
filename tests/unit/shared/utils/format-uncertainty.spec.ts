import { describe, expect, it } from 'vitest'
import { formatUncertainty } from '#shared/utils/format-uncertainty'

describe('a value with its standard uncertainty', () => {
  // JCGM 100:2008, 7.2.2: the number in brackets refers to the last digits of the result.
  it.each([
    [0.693, 0.006, '0.693(6)', '0.693 ± 0.006'],
    [0.69312, 0.00632, '0.693(6)', '0.693 ± 0.006'],
    [12.34, 1.4, '12.3(1.4)', '12.3 ± 1.4'], // two digits of an uncertainty that begins with 1
    [344.2, 2.1, '344(2)', '344 ± 2'],
    [344.2, 12, '344(12)', '344 ± 12'],
    [344.2, 23, '340(20)', '340 ± 20'],
    [12_345, 678, '12\u2009300(700)', '12\u2009300 ± 700'],
    [0.0478, 0.00014, '0.04780(14)', '0.04780 ± 0.00014'],
    [0.693, 0.0194, '0.693(19)', '0.693 ± 0.019'],
    [0.693, 0.0206, '0.69(2)', '0.69 ± 0.02'],
    [0.693, 0.00996, '0.693(10)', '0.693 ± 0.010'], // 0.00996 is 0.010 in two digits, which begins with 1
    [0.693, 0.096, '0.69(10)', '0.69 ± 0.10'], // one digit of 0.096 is 0.1, shown to the hundredth
    [-12.34, 1.4, '\u221212.3(1.4)', '\u221212.3 ± 1.4'],
    [1.5, 0.25, '1.5(3)', '1.5 ± 0.3'],
  ])('%d with %d is %j', (value, error, compact, long) => {
    expect(formatUncertainty(value, error)).toEqual({ compact, long })
  })

  it.each([
    [0.002, 0.006, '0.002(6)'], [-0.002, 0.006, '\u22120.002(6)'], [0.0002, 0.006, '0.000(6)'], [-0.0002, 0.006, '0.000(6)'],
    [0, 0.006, '0.000(6)'], [3, 40, '0(40)'], [0.4, 1.4, '0.4(1.4)'],
  ])('%d, below its error of %d, is %j', (value, error, compact) => {
    expect(formatUncertainty(value, error).compact).toBe(compact)
  })

  it.each([
    [0.693, 0, '0.6930'], [344, 0, '344.0'], [12_345, 0, '12\u2009345'], [-0.0478, 0, '\u22120.04780'], [0.0000123456, 0, '0.00001235'], [0, 0, '0'], [100, 0, '100.0'],
    [0.693, Number.NaN, '0.6930'], [0.693, Infinity, '0.6930'], [0.693, -1, '0.6930'],
  ])('%d with no uncertainty (%d) has four digits: %j', (value, error, text) => {
    expect(formatUncertainty(value, error)).toEqual({ compact: text, long: text })
  })

  it.each([Number.NaN, Infinity, -Infinity])('%d is a dash', (value) => {
    expect(formatUncertainty(value, 1)).toEqual({ compact: '\u2013', long: '\u2013' })
  })

  it('has the digit of the uncertainty in every decade', () => {
    for (let decade = -12; decade <= 9; decade += 1) {
      for (let digit = 2; digit <= 9; digit += 1) {
        // The uncertainty itself as the value: 0.006(6), 6(6), 600(600).
        const text = formatUncertainty(Number(`${digit}e${decade}`), Number(`${digit}e${decade}`)).compact
        const bracket = decade > 0 ? `${digit}${'0'.repeat(decade)}` : String(digit)
        expect(text.endsWith(`(${bracket})`), `${digit}e${decade} gave ${text}`).toBe(true)
      }
    }
  })

  it('does not fail on what is too small to print', () => {
    expect(() => formatUncertainty(1e-150, 1e-150)).not.toThrow()
    expect(() => formatUncertainty(1e-150, 0)).not.toThrow()
  })
})
