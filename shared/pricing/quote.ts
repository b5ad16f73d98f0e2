import { shareOf } from '#shared/money/money'
import { type ChargeLine, type ChargeQuantities, netOf, priceLines } from '#shared/pricing/lines'
import { type ClassPrices, type GroupClass, paysDeposit } from '#shared/pricing/rate-card'
import type { Interval, RunEstimate } from '#shared/planning/types'

/** What pricing needs beside the estimate. */
export interface QuoteFacts {
  readonly prices: ClassPrices
  readonly groupClass: GroupClass
  readonly reverseCharge: boolean
  readonly depositPercent: number
  readonly sampleCount: number
  /** Share of the boiled-off helium that comes back to recovery, 0 to 1. */
  readonly recoveryFraction: number
}

/** A quote: itemised for the likely case, with a low and a high total; amounts in minor units with VAT. */
export interface Quote {
  readonly lines: readonly ChargeLine[]
  readonly netMinor: number
  readonly vatMinor: number
  readonly vatBasisPoints: number
  readonly reverseCharge: boolean
  readonly totalMinor: Interval
  readonly depositMinor: number
}

/** Operator hours a run takes: two to start it, one to end it, half an hour to mount each sample (common practice, no source). */
const OPERATOR_HOURS = { startAndEnd: 3, perSample: 0.5 }

/** Quantities of a planned run at one point of its interval. */
export function plannedQuantities(estimate: Pick<RunEstimate, 'totalHours' | 'totalHeliumLitres'>, facts: Pick<QuoteFacts, 'sampleCount' | 'recoveryFraction'>, at: keyof Interval): ChargeQuantities {
  const heliumLitres = estimate.totalHeliumLitres[at]
  return {
    cooldowns: 1,
    cryostatDays: estimate.totalHours[at] / 24,
    heliumLitres,
    recoveredLitres: heliumLitres * facts.recoveryFraction,
    operatorHours: OPERATOR_HOURS.startAndEnd + OPERATOR_HOURS.perSample * facts.sampleCount,
    mountings: facts.sampleCount,
  }
}

/** VAT on a net amount; none under reverse charge, where the customer accounts for it. */
export function vatOn(netMinor: number, vatBasisPoints: number, reverseCharge: boolean): number {
  return reverseCharge ? 0 : shareOf(netMinor, vatBasisPoints)
}

/**
 * Quotes a run.
 *
 * @param estimate hours and litres with their intervals
 * @param facts prices and what the group is
 * @returns lines of the likely case, totals with VAT for all three, and the deposit (a percentage of the likely total)
 */
export function quoteRun(estimate: Pick<RunEstimate, 'totalHours' | 'totalHeliumLitres'>, facts: QuoteFacts): Quote {
  const { prices, reverseCharge } = facts
  const totalAt = (at: keyof Interval) => {
    const net = netOf(priceLines(plannedQuantities(estimate, facts, at), prices))
    return net + vatOn(net, prices.vatBasisPoints, reverseCharge)
  }
  const lines = priceLines(plannedQuantities(estimate, facts, 'likely'), prices)
  const netMinor = netOf(lines)
  const totals = [totalAt('low'), totalAt('likely'), totalAt('high')] as const
  // Where the credit for recovered helium comes near the price of a litre, more litres may cost less.
  const totalMinor = { low: Math.min(...totals), likely: totals[1], high: Math.max(...totals) }
  return {
    lines,
    netMinor,
    vatMinor: vatOn(netMinor, prices.vatBasisPoints, reverseCharge),
    vatBasisPoints: prices.vatBasisPoints,
    reverseCharge,
    totalMinor,
    depositMinor: paysDeposit(facts.groupClass) ? shareOf(totalMinor.likely, facts.depositPercent * 100) : 0,
  }
}
