import { sql } from 'drizzle-orm'
import type { Board, BoardClosure, BoardLane, BoardRun, DueReading, WaitingRequest } from '#shared/types/board'
import type { PhaseId } from '#shared/planning/types'
import type { Database } from '#server/db/client'
import { dayRangeKey, facilityDayRange, type DayRange } from '#server/db/day-range'
import { isoInstant } from '#server/db/iso-instant'
import { sharedRead } from '#server/utils/shared-read'

/** A run as the database gives it, before anything is left out for the viewer. */
export interface BoardRunRow extends Omit<BoardRun, 'phasesStartAt' | 'groupName' | 'id' | 'number'> {
  id: string
  number: number
  groupName: string
  groupId: string
  ownerId: string
  finishedAt: string | null
  logged: { phase: PhaseId, at: string }[]
}

/** A running run with its last level reading. */
export interface ReadingRow extends Omit<DueReading, 'dueAt'> { startedAt: string }

/** Everything the board shows, for everybody alike. */
export interface BoardRows extends Pick<Board, 'facilityName' | 'timeZone' | 'from' | 'to'> {
  lanes: BoardLane[]
  runs: BoardRunRow[]
  closures: BoardClosure[]
  requests: WaitingRequest[]
  readings: ReadingRow[]
}

const startsAt = isoInstant(sql`lower(run.slot)`)
const endsAt = isoInstant(sql`upper(run.slot)`)

/**
 * Reads the board in one round trip: the database builds the JSON, so that a request costs one statement whatever it shows.
 * People who ask at the same moment share it.
 */
export const readBoardRows = sharedRead<DayRange, BoardRows>(dayRangeKey, loadBoardRows)

async function loadBoardRows(db: Database, range: DayRange): Promise<BoardRows> {
  const { rows } = await db.execute(sql`
    with range as (${facilityDayRange(range)})
    select json_build_object(
      'facilityName', range.name, 'timeZone', range.time_zone, 'from', range.first_day, 'to', range.last_day,
      'lanes', (
        select coalesce(json_agg(json_build_object('id', id, 'slug', slug, 'name', name, 'kind', kind, 'baseTemperatureK', base_temperature_k,
          'maximumFieldT', maximum_field_t, 'usesLiquid', uses_liquid) order by position, name), '[]')
        from cryostats where retired_at is null or retired_at > range.from_at),
      'runs', (
        select coalesce(json_agg(json_build_object('id', run.id, 'number', run.number, 'title', run.title, 'cryostatId', run.cryostat_id, 'state', run.state,
          'groupId', run.group_id, 'groupName', team.name, 'ownerId', run.requested_by, 'startsAt', ${startsAt}, 'endsAt', ${endsAt},
          'lowestK', run.plan_input -> 'temperatureLowK', 'heliumLitres', run.estimate #> '{totalHeliumLitres,likely}', 'finishedAt', ${isoInstant(sql`run.finished_at`)},
          'phases', (select coalesce(json_agg(json_build_object('phase', part.phase -> 'phase', 'hours', part.phase #> '{hours,likely}') order by part.position), '[]')
            from jsonb_array_elements(run.estimate -> 'phases') with ordinality part (phase, position)),
          'logged', (select coalesce(json_agg(json_build_object('phase', entry.phase, 'at', ${isoInstant(sql`entry.at`)}) order by entry.at), '[]')
            from run_entries entry where entry.run_id = run.id and entry.kind = 'phase' and entry.phase is not null)
        ) order by lower(run.slot), run.number), '[]')
        from runs run join groups team on team.id = run.group_id
        where run.slot && tstzrange(range.from_at, range.to_at) and run.state in ('asked', 'approved', 'confirmed', 'running', 'finished', 'settled')),
      'closures', (
        select coalesce(json_agg(json_build_object('id', id, 'cryostatId', cryostat_id, 'startsAt', ${isoInstant(sql`lower(during)`)}, 'endsAt', ${isoInstant(sql`upper(during)`)},
          'reason', reason) order by lower(during)), '[]')
        from closures where during && tstzrange(range.from_at, range.to_at)),
      'requests', (
        select coalesce(json_agg(json_build_object('id', run.id, 'number', run.number, 'title', run.title, 'groupName', team.name, 'cryostatName', cryostat.name,
          'startsAt', ${startsAt}, 'endsAt', ${endsAt}) order by lower(run.slot), run.number), '[]')
        from runs run join groups team on team.id = run.group_id join cryostats cryostat on cryostat.id = run.cryostat_id where run.state = 'asked'),
      'readings', (
        select coalesce(json_agg(json_build_object('runId', run.id, 'runNumber', run.number, 'cryostatName', cryostat.name, 'startedAt', ${isoInstant(sql`coalesce(run.started_at, lower(run.slot))`)},
          'last', (select json_build_object('at', ${isoInstant(sql`entry.at`)}, 'levelPercent', entry.level_percent, 'boilOffLitresPerHour', entry.boil_off_litres_per_hour, 'outsideUsual', entry.outside_usual)
            from run_entries entry where entry.run_id = run.id and entry.kind = 'level' and entry.level_percent is not null order by entry.at desc limit 1)
        ) order by cryostat.position), '[]')
        from runs run join cryostats cryostat on cryostat.id = run.cryostat_id where run.state = 'running' and cryostat.uses_liquid)
    ) as board from range`)
  const board = rows[0]?.board
  if (!board) throw new Error('the facility has not been set up')
  return board as BoardRows
}
