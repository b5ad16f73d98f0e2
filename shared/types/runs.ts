import type { PhaseId, RunEstimate } from '#shared/planning/types'
import type { GroupClass } from '#shared/pricing/rate-card'
import type { Quote } from '#shared/pricing/quote'
import type { RunState } from '#shared/runs/states'

/** One line of a run list. */
export interface RunListItem {
  id: string
  number: number
  title: string
  state: RunState
  cutShort: boolean
  cryostat: string
  group: string
  startsAt: string
  endsAt: string
  payBy: string | null
  samples: string
}

/** A page of runs. */
export interface RunList { items: RunListItem[], nextCursor: string | null, timeZone: string }

/** One step in a run's life, as told to people. */
export interface RunTransitionItem { from: RunState | null, to: RunState, by: string | null, reason: string, at: string }

/** What a payment of a run stands at. */
export interface RunPaymentItem { kind: 'deposit' | 'balance' | 'refund', state: string, amountMinor: number, at: string, failure: string | null, actionUrl: string | null }

/** A run with everything its page shows. */
export interface RunDetail extends RunListItem {
  timeZone: string
  currency: string
  groupId: string
  groupClass: GroupClass
  cryostatSlug: string
  usesLiquid: boolean
  requestedBy: string
  isOwn: boolean
  startedAt: string | null
  finishedAt: string | null
  costCode: string | null
  purchaseOrder: string | null
  planInput: { temperatureLowK: number, temperatureHighK: number, points: number, nitrogenPrecool: boolean, sweeps: number }
  estimate: RunEstimate
  /** Absent for facility operators, who do not see prices. */
  quote: (Quote & { lockedUntil: string }) | null
  sampleList: { id: string, name: string, formula: string, hazards: string }[]
  transitions: RunTransitionItem[]
  payments: RunPaymentItem[]
  invoice: { id: string, number: string } | null
  may: { approve: boolean, decline: boolean, withdraw: boolean, pay: boolean, start: boolean, log: boolean, finish: boolean, upload: boolean }
}

/** One line of a run sheet. */
export interface SheetEntry {
  id: string
  kind: 'phase' | 'level' | 'transfer' | 'temperature' | 'gas-meter' | 'note'
  at: string
  by: string | null
  phase: PhaseId | null
  levelPercent: number | null
  liquidLitres: number | null
  beforeLitres: number | null
  drawnLitres: number | null
  boilOffLitresPerHour: number | null
  outsideUsual: boolean
  temperatureK: number | null
  gasMeterM3: number | null
  note: string
}

/** The run sheet: what was logged and what it comes to. */
export interface RunSheet {
  run: RunDetail
  entries: SheetEntry[]
  phase: PhaseId | null
  nextPhases: PhaseId[]
  /** Helium so far, litres of liquid; null for a cryostat without liquid. */
  helium: { usedLitres: number, transferLossLitres: number, returnedLitres: number, plannedLitres: { low: number, likely: number, high: number }, split: { cooldown: number, staticBoilOff: number, measurement: number } } | null
  usualBoilOff: { lowLitresPerHour: number, highLitresPerHour: number } | null
  dewars: { id: string, name: string, litres: number }[]
  /** Charges so far with VAT, minor units; null for people who do not see prices. */
  costMinor: number | null
  nextReadingAt: string | null
  /** Planned temperature by hour from the start, for the plot. */
  plannedProfile: { hour: number, temperatureK: number }[]
}
