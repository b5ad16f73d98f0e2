import { sql } from 'drizzle-orm'
import type { Actor } from '#shared/access/rules'
import type { BoardMonth } from '#shared/types/board'
import type { Database } from '#server/db/client'
import { authorise } from '#server/services/access/authorise'
import { sharedRead } from '#server/utils/shared-read'

const readMonthRows = sharedRead<{ month: string }, BoardMonth>(({ month }) => month, loadMonth)

/**
 * Which cryostats are free on each day of a month: those that no run and no closure holds at any hour of it.
 *
 * @param db database
 * @param query month as `YYYY-MM`, and who asks
 * @returns every day of the month with the slugs of its free cryostats
 * @throws DomainError when the actor may not read the board
 */
export async function readBoardMonth(db: Database, { actor, month }: { actor: Actor, month: string }): Promise<BoardMonth> {
  authorise(actor, 'board:read')
  return readMonthRows(db, { month })
}

async function loadMonth(db: Database, { month }: { month: string }): Promise<BoardMonth> {
  const { rows } = await db.execute(sql`
    with days as (
      select day::date as day, tstzrange(day at time zone facility.time_zone, (day + interval '1 day') at time zone facility.time_zone) as span
      from (select time_zone from facilities limit 1) facility,
        generate_series(${`${month}-01`}::timestamp, ${`${month}-01`}::timestamp + interval '1 month' - interval '1 day', interval '1 day') day
    )
    select json_build_object(
      'month', ${month}::text, 'timeZone', (select time_zone from facilities limit 1),
      'lanes', (select coalesce(json_agg(json_build_object('id', id, 'slug', slug, 'name', name) order by position, name), '[]') from cryostats where retired_at is null),
      'days', (select json_agg(json_build_object('day', days.day, 'free', (
          select coalesce(json_agg(cryostat.slug order by cryostat.position, cryostat.name), '[]') from cryostats cryostat
          where cryostat.retired_at is null and not exists (select 1 from cryostat_holds hold where hold.cryostat_id = cryostat.id and hold.during && days.span)
        )) order by days.day) from days)
    ) as month`)
  return rows[0]?.month as BoardMonth
}
