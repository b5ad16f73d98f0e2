import type { BoardClosure, BoardRun } from '#shared/types/board'

/** One thing drawn and named on a lane: a run, or the requests that compete for the same days. */
export interface LaneItem {
  readonly key: string
  readonly runs: readonly BoardRun[]
  readonly startMs: number
  readonly endMs: number
  /** 0: words under the rim; 1: lower, because something else holds these days. */
  readonly wordsRow: 0 | 1
}

const startOf = (run: BoardRun) => Date.parse(run.startsAt)
const endOf = (run: BoardRun) => Date.parse(run.endsAt)
const keyOf = (run: BoardRun) => run.id ?? `${run.state}-${run.startsAt}`

/**
 * What a lane shows, in order of time. Requests that overlap one another become one item; every other run stands alone.
 *
 * @param runs runs of one cryostat, any order
 * @param closures closures of the same cryostat
 * @returns items by start
 */
export function laneItems(runs: readonly BoardRun[], closures: readonly BoardClosure[] = []): LaneItem[] {
  const held = runs.filter(run => run.state !== 'asked')
  const holds = [...held, ...closures].map(hold => ({ startMs: Date.parse(hold.startsAt), endMs: Date.parse(hold.endsAt) }))
  const single = held.map((run): LaneItem => ({ key: keyOf(run), runs: [run], startMs: startOf(run), endMs: endOf(run), wordsRow: 0 }))
  const competing = clusters(runs.filter(run => run.state === 'asked')).map((cluster): LaneItem => {
    const startMs = Math.min(...cluster.map(startOf))
    const endMs = Math.max(...cluster.map(endOf))
    return { key: cluster.map(keyOf).join('+'), runs: cluster, startMs, endMs, wordsRow: holds.some(hold => hold.startMs < endMs && hold.endMs > startMs) ? 1 : 0 }
  })
  return [...single, ...competing].sort((a, b) => a.startMs - b.startMs || a.endMs - b.endMs)
}

/** Runs that overlap one another, directly or through others, together. */
function clusters(runs: readonly BoardRun[]): BoardRun[][] {
  const sorted = [...runs].sort((a, b) => startOf(a) - startOf(b))
  const found: BoardRun[][] = []
  let untilMs = Number.NEGATIVE_INFINITY
  for (const run of sorted) {
    const current = found.at(-1)
    const belongs = current !== undefined && startOf(run) < untilMs
    if (belongs) current.push(run)
    else found.push([run])
    untilMs = belongs ? Math.max(untilMs, endOf(run)) : endOf(run)
  }
  return found
}
