import type { LaneItem } from '#shared/board/lane-items'
import { RUN_STATE_WORDS } from '#shared/runs/states'
import type { BoardClosure, BoardRun, BoardRunState } from '#shared/types/board'
import { formatDay, formatSlot } from '#shared/utils/format-date'

/** How a state is named on the board. */
export function boardStateWord(state: BoardRunState): string {
  return state === 'taken' ? 'taken' : RUN_STATE_WORDS[state]
}

const groupWord = (run: BoardRun) => run.groupName === null ? 'another group' : `${run.groupName} group`

/**
 * The two lines that name an item on its lane.
 *
 * @param item a run, or competing requests
 * @returns what it is, and whose with its state
 */
export function itemWords({ runs }: LaneItem): { title: string, detail: string } {
  const [only] = runs
  if (runs.length > 1) return { title: `${runs.length} requests`, detail: [...new Set(runs.map(run => run.groupName ?? 'another group'))].join(', ') }
  if (!only) return { title: '', detail: '' }
  return { title: only.title, detail: only.id === null ? groupWord(only) : `${groupWord(only)} · ${boardStateWord(only.state)}` }
}

/**
 * One sentence about a run, as read aloud.
 *
 * @param run the run
 * @param timeZone the facility's IANA zone
 * @returns what it is, whose, its state, from and to
 */
export function runSentence(run: BoardRun, timeZone: string): string {
  const what = run.id === null ? [run.title] : [run.title, groupWord(run), boardStateWord(run.state)]
  return `${what.join(', ')}, ${formatSlot(run.startsAt, run.endsAt, timeZone)}`
}

/**
 * The name of a day on a lane, as read aloud.
 *
 * @param cell the cryostat's name, the day as `YYYY-MM-DD`, what touches that day, and the facility's zone
 * @returns cryostat and day, then every run and closure of it, or that it is free
 */
export function cellSentence(
  { cryostatName, day, runs, closures, timeZone }:
  { readonly cryostatName: string, readonly day: string, readonly runs: readonly BoardRun[], readonly closures: readonly BoardClosure[], readonly timeZone: string },
): string {
  const what = [
    ...runs.map(run => runSentence(run, timeZone)),
    ...closures.map(closure => `closed, ${closure.reason}, ${formatSlot(closure.startsAt, closure.endsAt, timeZone)}`),
  ]
  return `${cryostatName}, ${formatDay(day)}: ${what.length > 0 ? what.join('; ') : 'free'}`
}
