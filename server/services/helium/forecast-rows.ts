import { sql } from 'drizzle-orm'
import type { RunEstimate } from '#shared/planning/types'
import type { Database } from '#server/db/client'
import { facilityDayRange, type DayRange } from '#server/db/day-range'
import { isoInstant } from '#server/db/iso-instant'

/** What the books and the plans say of the stock in the storage dewars. */
export interface StockRows {
  timeZone: string
  reserveLitres: number
  /** By the books, now. */
  stockMg: number
  /** What the dewars together gained or gave since the start of the range, in order of time. */
  changes: { at: string, amountMg: number }[]
  /** Runs whose helium is still to be drawn. */
  runs: { runId: string, held: boolean, startsAt: string, phases: RunEstimate['phases'] }[]
  /** Ordered and not yet received. */
  deliveries: { dueAt: string, litres: number }[]
}

/** A range with the instants at which it starts and ends. */
export interface StockRowsInRange extends StockRows { fromAt: string, toAt: string }

/** Asked as a list, so that the few movements of the range are looked up by their index instead of joining all there ever were. */
const dewars = sql`array(select id from helium_accounts where kind = 'dewar')`

/**
 * Reads stock, its recent changes, plans and deliveries in one round trip.
 *
 * @param db database or transaction
 * @param range days of the history and the forecast
 * @throws Error when the facility has not been set up
 */
export async function readStockRows(db: Database, range: DayRange): Promise<StockRowsInRange> {
  const { rows } = await db.execute(sql`
    with range as (${facilityDayRange(range)})
    select json_build_object(
      'timeZone', range.time_zone, 'reserveLitres', range.reserve_litres, 'fromAt', ${isoInstant(sql`range.from_at`)}, 'toAt', ${isoInstant(sql`range.to_at`)},
      'stockMg', (select coalesce(sum(amount_mg), 0) from helium_postings where account_id = any(${dewars})),
      'changes', (
        select coalesce(json_agg(json_build_object('at', ${isoInstant(sql`movement.at`)}, 'amountMg', change.amount_mg) order by movement.at, movement.id), '[]')
        from helium_movements movement
        cross join lateral (select sum(amount_mg) as amount_mg from helium_postings where movement_id = movement.id and account_id = any(${dewars})) change
        where movement.at >= range.from_at and change.amount_mg <> 0),
      'runs', (
        select coalesce(json_agg(json_build_object('runId', id, 'held', state <> 'asked', 'startsAt', ${isoInstant(sql`coalesce(started_at, lower(slot))`)}, 'phases', estimate -> 'phases')), '[]')
        from runs where state in ('asked', 'approved', 'confirmed', 'running') and upper(slot) > ${range.now.toISOString()}::timestamptz),
      'deliveries', (
        select coalesce(json_agg(json_build_object('dueAt', ${isoInstant(sql`due_at`)}, 'litres', litres) order by due_at), '[]')
        from helium_deliveries where received_at is null)
    ) as stock from range`)
  const stock = rows[0]?.stock
  if (!stock) throw new Error('the facility has not been set up')
  return stock as StockRowsInRange
}
