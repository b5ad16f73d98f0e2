import { formatNumber } from './format-number'

/** A value with its standard uncertainty, compact and long. */
export interface FormattedUncertainty {
  /** `0.693(6)` */
  compact: string
  /** `0.693 ± 0.006`, for tooltips and screen readers */
  long: string
}

/** As many as can be printed. */
const MOST_DECIMALS = 100

/**
 * A value with its standard uncertainty in the compact form of the GUM (JCGM 100:2008, 7.2.2): one digit of the
 * uncertainty, two when the first is 1. Without an uncertainty, four digits of the value.
 *
 * @param value the number
 * @param standardError its standard uncertainty, in the same unit
 */
export function formatUncertainty(value: number, standardError: number): FormattedUncertainty {
  if (!Number.isFinite(value)) return { compact: '–', long: '–' }
  if (!(standardError > 0) || !Number.isFinite(standardError)) {
    const text = value === 0 ? '0' : formatNumber(value, Math.min(MOST_DECIMALS, Math.max(0, 3 - Math.floor(Math.log10(Math.abs(value))))))
    return { compact: text, long: text }
  }
  const decimalsFor = (error: number) => {
    const exponent = Math.floor(Math.log10(error))
    return -exponent + (error / 10 ** exponent < 1.95 ? 1 : 0)
  }
  const decimals = Math.min(MOST_DECIMALS, decimalsFor(Number(standardError.toPrecision(2))))
  const shown = Math.max(0, decimals)
  // Tens, hundreds and so on are counted in whole units: divided by 0.0001, 3 would become 30000.000000000004.
  const unit = 10 ** -Math.min(0, decimals)
  const error = Math.round(decimals < 0 ? standardError / unit : standardError * 10 ** decimals)
  const rounded = decimals < 0 ? Math.round(value / unit) * unit : value
  // From one unit on, the bracket repeats the decimal point: 12.3(1.4).
  const bracket = decimals < 0 ? String(error * unit) : shown > 0 && error >= 10 ** shown ? (error / 10 ** shown).toFixed(shown) : String(error)
  return {
    compact: `${formatNumber(rounded, shown)}(${bracket})`,
    long: `${formatNumber(rounded, shown)} ± ${formatNumber(decimals < 0 ? error * unit : error / 10 ** decimals, shown)}`,
  }
}
