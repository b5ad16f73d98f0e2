import { and, eq, sql } from 'drizzle-orm'
import type { Actor } from '#shared/access/rules'
import { runHeliumUse } from '#shared/helium/run-use'
import { temperatureProfile } from '#shared/planning/profile'
import { vatOn } from '#shared/pricing/quote'
import { netOf, priceLines } from '#shared/pricing/lines'
import { nextPhases } from '#shared/runs/phases'
import type { RunSheet, SheetEntry } from '#shared/types/runs'
import { heliumLitresFromMg, MS_PER_HOUR } from '#shared/units/helium-units'
import type { Database } from '#server/db/client'
import { cryostats, heliumAccounts, heliumMovements, heliumPostings, people, rateCardPrices, runEntries, runs } from '#server/db/schema'
import { authorise } from '#server/services/access/authorise'
import { readHeliumBalances } from '#server/services/helium/account-queries'
import { actualQuantities } from '#server/services/invoices/actual-quantities'
import { readRun } from '#server/services/runs/queries'
import { toHeliumLog } from './helium-log'
import { readUsualBoilOff } from './history'
import { sharedRead } from '#server/utils/shared-read'

/** Readings are due this often while a run is cold (common practice, no source). */
export const READING_EVERY_H = 8

/**
 * The run sheet with what it comes to: helium against plan, cost to here, what is due next.
 *
 * @param db database
 * @param input which run, who asks, and the instant
 */
export async function readSheet(db: Database, input: SheetRequest): Promise<RunSheet> {
  const sheet = await sharedSheet(db, input)
  authorise(input.actor, 'run:read', { groupId: sheet.run.groupId })
  return sheet
}

interface SheetRequest { runId: string, actor: Actor, now: Date }

/** What a sheet comes to may lag the clock by up to a minute; what is on it never lags. */
const keyOfSheet = ({ runId, actor, now }: SheetRequest) => `${runId} ${JSON.stringify(actor)} ${Math.floor(now.getTime() / 60_000)}`

const sharedSheet = sharedRead(keyOfSheet, async (db: Database, { runId, actor, now }: SheetRequest): Promise<RunSheet> => {
  const detail = await readRun(db, { runId, actor })
  const [row] = await db.select({ run: runs, cryostat: cryostats, prices: rateCardPrices }).from(runs).innerJoin(cryostats, eq(cryostats.id, runs.cryostatId))
    .leftJoin(rateCardPrices, and(eq(rateCardPrices.rateCardId, runs.rateCardId), eq(rateCardPrices.groupClass, detail.groupClass))).where(eq(runs.id, runId))
  const { run, cryostat, prices } = row!
  const sheet = await db.select({ entry: runEntries, by: people.name }).from(runEntries).leftJoin(people, eq(people.id, runEntries.recordedBy)).where(eq(runEntries.runId, runId)).orderBy(runEntries.at, runEntries.id)
  const entries = sheet.map(({ entry }) => entry)
  const returnedMg = await readReturnedMg(db, runId)
  const use = cryostat.usesLiquid
    ? runHeliumUse(toHeliumLog(entries, run.finishedAt ?? now, returnedMg), { staticBoilOffLitresPerHour: cryostat.staticBoilOffLitresPerHour, transferLossShare: cryostat.transferLossFraction })
    : null
  const band = cryostat.usesLiquid ? await readUsualBoilOff(db, cryostat.id) : undefined
  const phase = entries.filter(entry => entry.phase).at(-1)?.phase ?? null
  const lastReading = entries.filter(entry => entry.kind === 'level' || entry.kind === 'temperature' || entry.kind === 'transfer').at(-1)
  const quantities = run.startedAt ? actualQuantities({ run, entries, cryostat, returnedMg, sampleCount: detail.sampleList.length, until: run.finishedAt ?? now }) : null
  const cost = quantities && prices ? netOf(priceLines(quantities, prices)) : null
  const hours = run.estimate.phases.map(({ phase: name, hours: interval }) => ({ phase: name, hours: interval.likely }))
  return {
    run: detail,
    entries: sheet.map(({ entry, by }) => toSheetEntry(entry, by)),
    phase,
    nextPhases: run.state === 'running' ? nextPhases(phase) : [],
    helium: use && {
      usedLitres: heliumLitresFromMg(use.usedMg + use.transferLossMg), transferLossLitres: heliumLitresFromMg(use.transferLossMg), returnedLitres: heliumLitresFromMg(use.returnedMg),
      plannedLitres: { ...run.estimate.totalHeliumLitres },
      split: { cooldown: heliumLitresFromMg(use.cooldownMg), staticBoilOff: heliumLitresFromMg(use.staticBoilOffMg), measurement: heliumLitresFromMg(use.measurementMg) },
    },
    usualBoilOff: band ? { lowLitresPerHour: band.lowLitresPerHour, highLitresPerHour: band.highLitresPerHour } : null,
    dewars: detail.may.log ? (await readHeliumBalances(db)).filter(account => account.kind === 'dewar').map(({ id, name, balanceMg }) => ({ id, name, litres: heliumLitresFromMg(balanceMg) })) : [],
    costMinor: detail.quote && cost !== null ? cost + vatOn(cost, run.quote.vatBasisPoints, run.quote.reverseCharge) : null,
    nextReadingAt: run.state === 'running' ? new Date((lastReading?.at ?? run.startedAt ?? now).getTime() + READING_EVERY_H * MS_PER_HOUR).toISOString() : null,
    plannedProfile: temperatureProfile(hours, cryostat.baseTemperatureK).map(({ hour, temperatureK }) => ({ hour, temperatureK })),
  }
})

/** Helium that came back to recovery in a run, mg, by the books. */
export async function readReturnedMg(db: Database, runId: string): Promise<number> {
  const [row] = await db.select({ returnedMg: sql<number>`coalesce(sum(${heliumPostings.amountMg}), 0)::float8` }).from(heliumPostings)
    .innerJoin(heliumMovements, eq(heliumMovements.id, heliumPostings.movementId)).innerJoin(heliumAccounts, eq(heliumAccounts.id, heliumPostings.accountId))
    .where(and(eq(heliumMovements.runId, runId), eq(heliumAccounts.kind, 'recovery')))
  return Math.max(0, row?.returnedMg ?? 0)
}

function toSheetEntry(entry: typeof runEntries.$inferSelect, by: string | null): SheetEntry {
  const { id, kind, at, phase, levelPercent, liquidLitres, beforeLitres, drawnLitres, boilOffLitresPerHour, outsideUsual, temperatureK, gasMeterM3, note } = entry
  return { id, kind, at: at.toISOString(), by, phase, levelPercent, liquidLitres, beforeLitres, drawnLitres, boilOffLitresPerHour, outsideUsual, temperatureK, gasMeterM3, note }
}
