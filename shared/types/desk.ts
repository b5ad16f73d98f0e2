import type { RunListItem } from './runs'

/** A request with what the manager weighs. */
export interface DeskRequest extends RunListItem {
  groupClass: string
  heliumLitres: { low: number, likely: number, high: number }
  totalMinor: { low: number, likely: number, high: number }
  hours: number
  /** What holds some of its days already. */
  conflicts: { kind: 'run' | 'closure', label: string }[]
  /** Numbers of other requests for the same days. */
  competing: number[]
  /** Stock of liquid on the last day of the run if it goes (likely and low), litres; null without liquid. */
  stockAfter: { likely: number, low: number } | null
}

/** The manager's first page. */
export interface Desk {
  timeZone: string
  currency: string
  reserveLitres: number
  stockLitres: number
  requests: DeskRequest[]
  waitingForDeposit: RunListItem[]
  running: RunListItem[]
  toSettle: RunListItem[]
  shortage: string | null
  nextDelivery: { dueAt: string, litres: number } | null
}

/** The operator's first page. */
export interface Today {
  timeZone: string
  now: string
  running: (RunListItem & { phase: string | null, levelPercent: number | null, lastReadingAt: string | null, nextReadingAt: string, isLate: boolean, outsideUsual: boolean })[]
  starting: RunListItem[]
  ending: RunListItem[]
  dewars: { name: string, litres: number, capacityLitres: number | null }[]
}
