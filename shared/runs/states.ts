/** The life of a run, in order; the last three are ends without a cooldown. */
export const RUN_STATES = ['draft', 'asked', 'approved', 'confirmed', 'running', 'finished', 'settled', 'declined', 'withdrawn', 'lapsed'] as const

/** One state of a run. */
export type RunState = (typeof RUN_STATES)[number]

/** States that hold the cryostat: the database refuses an overlap between them. */
export const HOLDING_STATES: readonly RunState[] = ['approved', 'confirmed', 'running']

/** How each state is named to people. */
export const RUN_STATE_WORDS: Readonly<Record<RunState, string>> = {
  draft: 'draft',
  asked: 'asked for',
  approved: 'waiting for deposit',
  confirmed: 'confirmed',
  running: 'running',
  finished: 'finished',
  settled: 'settled',
  declined: 'declined',
  withdrawn: 'withdrawn',
  lapsed: 'lapsed',
}
