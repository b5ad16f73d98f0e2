import type { RunEstimate } from '#shared/planning/types'
import type { Quote } from '#shared/pricing/quote'

/** Reply of the estimate route. */
export interface PlanEstimateReply {
  estimate: RunEstimate
  quote: Quote
  currency: string
  rateCard: string
  /** End of the slot from the start that was asked for, ISO 8601. */
  endsAt: string | null
  /** What already holds days of the slot. */
  conflicts: { kind: 'run' | 'closure', label: string, startsAt: string, endsAt: string }[]
  /** Other requests for days of the slot. */
  competing: number
}

/** What the plan page offers to choose from. */
export interface PlanOptions {
  timeZone: string
  currency: string
  cryostats: { id: string, slug: string, name: string, kind: string, baseTemperatureK: number, highestTemperatureK: number, maximumFieldT: number, usesLiquid: boolean, nitrogenPrecool: boolean }[]
}
