import { desc, inArray, sql } from 'drizzle-orm'
import { PHASE_WORDS } from '#shared/runs/phases'
import type { Today } from '#shared/types/desk'
import { heliumLitresFromMg, MS_PER_HOUR } from '#shared/units/helium-units'
import type { Database } from '#server/db/client'
import { runEntries, runs } from '#server/db/schema'
import { readFacility } from '#server/services/facility/queries'
import { readHeliumBalances } from '#server/services/helium/account-queries'
import { READING_EVERY_H } from '#server/services/run-log/read-sheet'
import { listRunsInStates } from '#server/services/runs/queries'

const AHEAD_MS = 48 * MS_PER_HOUR

/**
 * What operators see first: running cryostats with the readings that are due, what starts and what ends soon, the dewars.
 *
 * @param db database
 * @param now the instant
 */
export async function readToday(db: Database, now: Date): Promise<Today> {
  const facility = await readFacility(db)
  const running = await listRunsInStates(db, ['running'])
  const entries = running.length > 0
    ? await db.select().from(runEntries).where(inArray(runEntries.runId, running.map(run => run.id))).orderBy(desc(runEntries.at), desc(runEntries.id))
    : []
  const soon = new Date(now.getTime() + AHEAD_MS).toISOString()
  const starting = await listRunsInStates(db, ['confirmed', 'approved'], sql`lower(${runs.slot}) < ${soon}::timestamptz`)
  return {
    timeZone: facility.timeZone,
    now: now.toISOString(),
    running: running.map((run) => {
      const sheet = entries.filter(entry => entry.runId === run.id)
      const reading = sheet.find(entry => entry.levelPercent !== null || entry.temperatureK !== null)
      const phase = sheet.find(entry => entry.phase)?.phase
      const dueAt = new Date((reading?.at ?? sheet[0]?.at ?? new Date(run.startsAt)).getTime() + READING_EVERY_H * MS_PER_HOUR)
      return {
        ...run,
        phase: phase ? PHASE_WORDS[phase] : null,
        levelPercent: sheet.find(entry => entry.levelPercent !== null)?.levelPercent ?? null,
        lastReadingAt: reading?.at.toISOString() ?? null,
        nextReadingAt: dueAt.toISOString(),
        isLate: dueAt < now,
        outsideUsual: sheet.find(entry => entry.kind === 'level')?.outsideUsual ?? false,
      }
    }).sort((a, b) => a.nextReadingAt.localeCompare(b.nextReadingAt)),
    starting,
    ending: running.filter(run => run.endsAt < soon),
    dewars: (await readHeliumBalances(db)).filter(account => account.kind === 'dewar').map(({ name, balanceMg, capacityLitres }) => ({ name, litres: heliumLitresFromMg(balanceMg), capacityLitres })),
  }
}
