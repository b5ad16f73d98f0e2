import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { formatUncertainty } from '#shared/utils/format-uncertainty'

const plain = ({ compact, long }: { compact: string, long: string }) => [compact, long].map(text => text.replaceAll('\u2009', ' '))

describe('a value with its standard uncertainty', () => {
  it.each([
    [0.693, 0.006, '0.693(6)', '0.693 ± 0.006'],
    // CODATA 2022, G: 6.67430(15) × 10⁻¹¹ m³ kg⁻¹ s⁻²; two digits where the first is 1.
    [6.6743, 0.00015, '6.67430(15)', '6.67430 ± 0.00015'],
    [343.2, 1.2, '343.2(1.2)', '343.2 ± 1.2'],
    [343.21, 2.4, '343(2)', '343 ± 2'],
    [1234, 56, '1 230(60)', '1 230 ± 60'],
    [-3.2, 0.04, '−3.20(4)', '−3.20 ± 0.04'],
    [0.04, 0.3, '0.0(3)', '0.0 ± 0.3'],
    [-0.04, 0.3, '0.0(3)', '0.0 ± 0.3'],
    [0.00005, 0.000003, '0.000050(3)', '0.000050 ± 0.000003'],
    // Rounding the uncertainty moves its first digit: 0.00996 → 0.010, 0.0196 → 0.02.
    [2, 0.00996, '2.000(10)', '2.000 ± 0.010'],
    [2, 0.0196, '2.00(2)', '2.00 ± 0.02'],
    [2, 0.0194, '2.000(19)', '2.000 ± 0.019'],
    [0.5, 0.96, '0.5(1.0)', '0.5 ± 1.0'],
    [48_123, 1_400, '48 100(1400)', '48 100 ± 1 400'],
  ])('%d with %d is %s', (value, standardError, compact, long) => {
    expect(plain(formatUncertainty(value, standardError))).toEqual([compact, long])
  })

  it.each([[0.6931, 0], [0.6931, Number.NaN], [0.6931, Infinity], [0.6931, -1]])('without an uncertainty shows the value alone (%d, %d)', (value, standardError) => {
    expect(formatUncertainty(value, standardError).compact).toBe('0.6931')
  })
  it('shows a dash for what is no number', () => {
    expect(formatUncertainty(Number.NaN, 1).compact).toBe('–')
  })

  it('never moves the value by more than half its uncertainty, nor the uncertainty by more than a quarter of itself', () => {
    fc.assert(fc.property(fc.double({ min: -1e6, max: 1e6, noNaN: true }), fc.double({ min: 1e-6, max: 1e5, noNaN: true }), (value, standardError) => {
      const [shown = 0, error = 0] = formatUncertainty(value, standardError).long.replaceAll('\u2009', '').replace('−', '-').split(' ± ').map(Number)
      expect(Math.abs(shown - value)).toBeLessThanOrEqual(standardError * 0.51)
      expect(Math.abs(error - standardError) / standardError).toBeLessThanOrEqual(0.26)
    }), { numRuns: 2000 })
  })
})
