import { multiplyPrice, roundHalfAwayFromZero } from '#shared/money/money'
import type { ClassPrices } from '#shared/pricing/rate-card'

/** What is charged for. */
export const CHARGE_KINDS = ['cooldown', 'cryostat-day', 'helium-litre', 'recovery-litre', 'operator-hour', 'mounting', 'minimum'] as const

/** One kind of charge. */
export type ChargeKind = (typeof CHARGE_KINDS)[number]

/** What of a run is charged: planned or logged. */
export interface ChargeQuantities {
  readonly cooldowns: number
  readonly cryostatDays: number
  readonly heliumLitres: number
  /** Litre-equivalents returned to recovery. */
  readonly recoveredLitres: number
  readonly operatorHours: number
  readonly mountings: number
}

/** One line: a quantity at a price, rounded once. A credit has a negative net amount. */
export interface ChargeLine {
  readonly kind: ChargeKind
  readonly label: string
  readonly unit: string
  readonly quantity: number
  readonly unitPriceMinor: number
  readonly netMinor: number
}

const LINES: readonly { kind: Exclude<ChargeKind, 'minimum'>, label: string, unit: string, quantity: keyof ChargeQuantities, price: keyof ClassPrices, sign: 1 | -1 }[] = [
  { kind: 'cooldown', label: 'Cooldown', unit: 'cooldown', quantity: 'cooldowns', price: 'perCooldownMinor', sign: 1 },
  { kind: 'cryostat-day', label: 'Time at the cryostat', unit: 'd', quantity: 'cryostatDays', price: 'perDayMinor', sign: 1 },
  { kind: 'helium-litre', label: 'Liquid helium used', unit: 'L', quantity: 'heliumLitres', price: 'perLitreMinor', sign: 1 },
  { kind: 'recovery-litre', label: 'Helium returned to recovery', unit: 'L eq', quantity: 'recoveredLitres', price: 'recoveryCreditPerLitreMinor', sign: -1 },
  { kind: 'operator-hour', label: 'Operator', unit: 'h', quantity: 'operatorHours', price: 'perOperatorHourMinor', sign: 1 },
  { kind: 'mounting', label: 'Sample mounting', unit: 'sample', quantity: 'mountings', price: 'perMountingMinor', sign: 1 },
]

const DECIMALS: Readonly<Record<keyof ChargeQuantities, number>> = { cooldowns: 0, cryostatDays: 2, heliumLitres: 1, recoveredLitres: 1, operatorHours: 2, mountings: 0 }

/** Quantities as charged: litres to a tenth, days and hours to a hundredth, so that the paper's arithmetic can be redone by hand. */
export function chargedQuantity(key: keyof ChargeQuantities, value: number): number {
  const scale = 10 ** DECIMALS[key]
  return roundHalfAwayFromZero(value * scale) / scale
}

/**
 * Prices quantities line by line; kinds of zero quantity or price are left out. When the sum is under the minimum charge,
 * a line makes it up.
 *
 * @param quantities what is charged
 * @param prices of the group's class
 * @returns lines whose net amounts add up to at least the minimum
 */
export function priceLines(quantities: ChargeQuantities, prices: ClassPrices): ChargeLine[] {
  const lines = LINES.flatMap((line): ChargeLine[] => {
    const quantity = chargedQuantity(line.quantity, quantities[line.quantity])
    const unitPriceMinor = prices[line.price] * line.sign
    if (quantity === 0 || unitPriceMinor === 0) return []
    return [{ kind: line.kind, label: line.label, unit: line.unit, quantity, unitPriceMinor, netMinor: multiplyPrice(unitPriceMinor, quantity) }]
  })
  const net = netOf(lines)
  if (net < prices.minimumMinor) {
    const missing = prices.minimumMinor - net
    lines.push({ kind: 'minimum', label: 'Made up to the minimum charge', unit: 'run', quantity: 1, unitPriceMinor: missing, netMinor: missing })
  }
  return lines
}

/** Net amount of lines, minor units. */
export function netOf(lines: readonly Pick<ChargeLine, 'netMinor'>[]): number {
  return lines.reduce((sum, line) => sum + line.netMinor, 0)
}
