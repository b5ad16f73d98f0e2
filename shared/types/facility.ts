import type { ClassPrices, GroupClass } from '#shared/pricing/rate-card'

/** A rate card as everyone may read it. */
export interface RateCardSheet {
  id: string
  name: string
  validFrom: string
  currency: string
  depositPercent: number
  isInForce: boolean
  prices: (ClassPrices & { groupClass: GroupClass })[]
}

/** A person as the manager sees them. */
export interface PersonItem {
  id: string
  name: string
  email: string
  roles: string[]
  groups: string[]
  lastSeenAt: string | null
  isDisabled: boolean
}

/** The books of helium: accounts, what moved, what is ordered. */
export interface HeliumBooksReply {
  timeZone: string
  accounts: { id: string, kind: 'supplier' | 'dewar' | 'cryostat' | 'recovery' | 'lost', name: string, capacityLitres: number | null, litres: number }[]
  movements: { id: string, at: string, reason: string, runId: string | null, runNumber: number | null, postings: { account: string, litres: number }[] }[]
  deliveries: { id: string, dueAt: string, litres: number, dewar: string, supplierReference: string }[]
}

/** A cryostat's page: its facts and what its past taught. */
export interface CryostatSheet {
  name: string
  slug: string
  kind: string
  baseTemperatureK: number
  maximumFieldT: number
  usesLiquid: boolean
  vesselLitres: number
  roomVolumeM3: number
  coldMass: { material: string, massKg: number }[]
  usualBoilOff: { lowLitresPerHour: number, medianLitresPerHour: number, highLitresPerHour: number, count: number } | null
  gasUseShare: { mean: number, sd: number }
  finishedRuns: number
  phases: { phase: string, mean: number, sd: number }[]
  oxygen: { percent: number, sentence: string } | null
  recent: { id: string, number: number, title: string, startsAt: string }[]
  timeZone: string
}
