import type { ChargeQuantities } from '#shared/pricing/lines'
import type { ClassPrices } from '#shared/pricing/rate-card'

/** An invented card of an academic group, in cents. */
export const PRICES: ClassPrices = {
  perCooldownMinor: 320_00, perDayMinor: 160_00, perLitreMinor: 11_50, recoveryCreditPerLitreMinor: 4_50,
  perOperatorHourMinor: 65_00, perMountingMinor: 50_00, minimumMinor: 250_00, vatBasisPoints: 2500,
}

/** No quantity at all, with what is given in its place. */
export const quantities = (given: Partial<ChargeQuantities> = {}): ChargeQuantities =>
  ({ cooldowns: 0, cryostatDays: 0, heliumLitres: 0, recoveredLitres: 0, operatorHours: 0, mountings: 0, ...given })
