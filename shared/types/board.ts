import type { CryostatKind, PhaseId } from '#shared/planning/types'
import type { HeliumForecastReply } from '#shared/types/helium-forecast'

/** States a run has on the board; `taken` stands for every holding state of a run the viewer may not see into. */
export const BOARD_RUN_STATES = ['asked', 'approved', 'confirmed', 'running', 'finished', 'settled', 'taken'] as const
export type BoardRunState = (typeof BOARD_RUN_STATES)[number]

/** One cryostat's row. */
export interface BoardLane {
  id: string
  slug: string
  name: string
  kind: CryostatKind
  baseTemperatureK: number
  maximumFieldT: number
  usesLiquid: boolean
}

/** One phase of a run, laid end to end from `phasesStartAt`. */
export interface BoardPhase { phase: PhaseId, hours: number }

/** A run that overlaps the range. */
export interface BoardRun {
  /** Null, with number, group and temperature, where the viewer may not see into the run. */
  id: string | null
  number: number | null
  title: string
  groupName: string | null
  cryostatId: string
  state: BoardRunState
  startsAt: string
  endsAt: string
  phasesStartAt: string
  /** As planned, or as logged for the phases already begun; empty where the viewer may not see them. */
  phases: BoardPhase[]
  lowestK: number | null
  heliumLitres: number | null
}

/** Days on which a cryostat takes no runs. */
export interface BoardClosure { id: string, cryostatId: string, startsAt: string, endsAt: string, reason: string }

/** A request that waits for the manager. */
export interface WaitingRequest { id: string, number: number, title: string, groupName: string, cryostatName: string, startsAt: string, endsAt: string }

/** A running run whose level is to be read. */
export interface DueReading {
  runId: string
  runNumber: number
  cryostatName: string
  dueAt: string
  /** The last reading, where there is one. */
  last: { at: string, levelPercent: number, boilOffLitresPerHour: number | null, outsideUsual: boolean } | null
}

/** What waits for people of the facility. */
export interface BoardDesk {
  /** Managers only. */
  requests: WaitingRequest[] | null
  readings: DueReading[]
}

/** The board over `[from, to)`, whole days of the facility. */
export interface Board {
  facilityName: string
  timeZone: string
  /** `YYYY-MM-DD`, first day and the day after the last. */
  from: string
  to: string
  now: string
  lanes: BoardLane[]
  runs: BoardRun[]
  closures: BoardClosure[]
  /** For people with a facility role. */
  desk: BoardDesk | null
  /** Where it was asked for: the helium strip of the same days. */
  helium: HeliumForecastReply | null
}

/** Which cryostats are free on each day of a month. */
export interface BoardMonth {
  month: string
  timeZone: string
  lanes: Pick<BoardLane, 'id' | 'slug' | 'name'>[]
  /** Slugs of the cryostats that nobody holds at any hour of that day. */
  days: { day: string, free: string[] }[]
}
