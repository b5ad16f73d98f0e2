import { can, hasFacilityRole, type Actor } from '#shared/access/rules'
import { phasesAsRun } from '#shared/board/phases-as-run'
import { levelReadingDueMs } from '#shared/helium/reading-due'
import type { Board, BoardDesk, BoardRun } from '#shared/types/board'
import type { Database } from '#server/db/client'
import { authorise } from '#server/services/access/authorise'
import { readHeliumForecast } from '#server/services/helium/forecast-queries'
import { readBoardRows, type BoardRows, type BoardRunRow } from './board-rows'

/** What is asked of the board: days of the facility (both or neither), and who asks. */
export interface BoardQuery { actor: Actor, from?: string, to?: string, withHelium?: boolean, now: Date }

/**
 * The board as the viewer may see it: runs of other groups show only that the days are taken or asked for.
 *
 * @param db database
 * @param query first day and the day after the last, `YYYY-MM-DD` (without them two weeks from this week's Monday), whether with the helium strip, and who asks
 * @returns lanes, runs, closures, and for people of the facility what waits for them
 * @throws DomainError when the actor may not read the board
 */
export async function readBoard(db: Database, { actor, from, to, withHelium, now }: BoardQuery): Promise<Board> {
  authorise(actor, 'board:read')
  const [{ lanes, closures, ...rows }, helium] = await Promise.all([
    readBoardRows(db, { from: from ?? null, to: to ?? null, now }),
    withHelium ? readHeliumForecast(db, { actor, from, to, now }) : null,
  ])
  return {
    facilityName: rows.facilityName,
    timeZone: rows.timeZone,
    from: rows.from,
    to: rows.to,
    now: now.toISOString(),
    lanes,
    runs: rows.runs.map(run => can(actor, 'run:read', { groupId: run.groupId, ownerId: run.ownerId }) ? openRun(run) : closedRun(run)),
    closures,
    desk: hasFacilityRole(actor) ? deskOf(actor, rows) : null,
    helium,
  }
}

function openRun({ groupId: _, ownerId: __, finishedAt, logged, ...run }: BoardRunRow): BoardRun {
  const ended = finishedAt === null ? undefined : Date.parse(finishedAt)
  const asRun = phasesAsRun(run.phases, logged.map(({ phase, at }) => ({ phase, atMs: Date.parse(at) })), ended)
  return {
    ...run,
    phases: asRun.phases.map(({ phase, hours }) => ({ phase, hours: Math.round(hours * 100) / 100 })),
    phasesStartAt: asRun.startMs === undefined ? run.startsAt : new Date(asRun.startMs).toISOString(),
    // A run that is over gave back the rest of its days.
    endsAt: finishedAt !== null && finishedAt < run.endsAt ? finishedAt : run.endsAt,
  }
}

/** Only what keeps others from asking for days in vain: which cryostat, when, and whether it is held or asked for. */
function closedRun({ cryostatId, state, startsAt, endsAt, finishedAt }: BoardRunRow): BoardRun {
  const isAsked = state === 'asked'
  return {
    id: null,
    number: null,
    title: isAsked ? 'Asked for' : 'Taken',
    groupName: null,
    cryostatId,
    state: isAsked ? 'asked' : 'taken',
    startsAt,
    endsAt: finishedAt !== null && finishedAt < endsAt ? finishedAt : endsAt,
    phasesStartAt: startsAt,
    phases: [],
    lowestK: null,
    heliumLitres: null,
  }
}

function deskOf(actor: Actor, { requests, readings }: Pick<BoardRows, 'requests' | 'readings'>): BoardDesk {
  return {
    requests: can(actor, 'desk:read') ? requests : null,
    readings: readings.map(({ startedAt, ...reading }) => ({
      ...reading,
      dueAt: new Date(levelReadingDueMs({ startedMs: Date.parse(startedAt), lastMs: reading.last ? Date.parse(reading.last.at) : undefined })).toISOString(),
    })).sort((a, b) => a.dueAt.localeCompare(b.dueAt)),
  }
}
