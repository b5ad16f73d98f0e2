import { and, desc, eq, isNotNull, lte } from 'drizzle-orm'
import type { Actor } from '#shared/access/rules'
import { DomainError } from '#shared/errors'
import { judgeBoilOff, SHORTEST_STRETCH_HOURS } from '#shared/helium/boil-off'
import { checkCovered } from '#shared/helium/entries'
import { boilOffEntry, stockTakeEntry, transferEntry } from '#shared/helium/movements'
import { litresFromLevel } from '#shared/helium/vessel'
import { checkNextPhase } from '#shared/runs/phases'
import type { RunEntryInput } from '#shared/schemas/run-log'
import { heliumMgFromLitres, MS_PER_HOUR } from '#shared/units/helium-units'
import type { Database } from '#server/db/client'
import { cryostats, runEntries, runs } from '#server/db/schema'
import { authorise } from '#server/services/access/authorise'
import { writeAudit } from '#server/services/audit/write-audit'
import { type CryostatAccounts, findCryostatAccounts, findDewar, readHeliumBalances } from '#server/services/helium/account-queries'
import { postHeliumEntry } from '#server/services/helium/post-entry'
import { readUsualBoilOff } from './history'

/** A clock of an operator's tablet may run ahead by this much. */
const CLOCK_TOLERANCE_MS = 5 * 60_000

type Entry = typeof runEntries.$inferSelect
type NewEntry = Omit<typeof runEntries.$inferInsert, 'id'>
interface RecordedRun { run: typeof runs.$inferSelect, cryostat: typeof cryostats.$inferSelect, actor: Actor }

/** What recording gives back: the line as written and, for a level, what its boil-off means. */
export interface RecordedEntry { entry: Entry, remark: string | null, isRepeat: boolean }

/**
 * Records one line of the run sheet: computes litres and boil-off, posts the helium movement, and flags what is unusual.
 * Sent twice with the same key it is recorded once.
 *
 * @param db database
 * @param input the run, who records, the entry as typed, and the instant of recording
 * @throws DomainError when the run is not running, the time is outside it, or the numbers cannot be
 */
export async function recordEntry(db: Database, input: { runId: string, actor: Actor, entry: RunEntryInput, now: Date }): Promise<RecordedEntry> {
  const { runId, actor, entry, now } = input
  return db.transaction(async (tx) => {
    // Locked so that two operators' entries are put in one order.
    const [run] = await tx.select().from(runs).where(eq(runs.id, runId)).for('update')
    authorise(actor, 'run:log', run ? { groupId: run.groupId } : {})
    if (!run) throw new DomainError('not-found', 'There is no such run.')
    const [repeat] = await tx.select().from(runEntries).where(eq(runEntries.clientKey, entry.clientKey))
    if (repeat) return { entry: repeat, remark: null, isRepeat: true }
    if (run.state !== 'running') throw new DomainError('conflict', 'This run is not running, so nothing can be recorded. Start it first.')
    checkInstant(run.startedAt ?? run.slot.startsAt, entry.at, now)
    const [cryostat] = await tx.select().from(cryostats).where(eq(cryostats.id, run.cryostatId))
    const recorded: RecordedRun = { run, cryostat: cryostat!, actor }
    const written = await write(tx, recorded, entry)
    await writeAudit(tx, { actorId: actor.personId, action: 'run:log', objectType: 'run', objectId: runId, detail: { entryId: written.entry.id, kind: entry.kind } })
    return { ...written, isRepeat: false }
  })
}

function checkInstant(startedAt: Date, at: Date, now: Date) {
  // Times are typed to the minute: one within the minute of the start is not before it.
  if (at.getTime() < Math.floor(startedAt.getTime() / 60_000) * 60_000) throw new DomainError('invalid', 'This time is before the run started. Enter a time after the start.', ['at'])
  if (at.getTime() > now.getTime() + CLOCK_TOLERANCE_MS) throw new DomainError('invalid', 'This time is still to come. Enter the time at which it was read.', ['at'])
}

async function write(tx: Database, recorded: RecordedRun, entry: RunEntryInput): Promise<Omit<RecordedEntry, 'isRepeat'>> {
  switch (entry.kind) {
    case 'level': return recordLevel(tx, recorded, entry)
    case 'transfer': return recordTransfer(tx, recorded, entry)
    case 'phase': {
      const current = await lastEntry(tx, recorded.run.id, 'phase', entry.at)
      checkNextPhase(current?.phase ?? null, entry.phase)
      return { entry: await insert(tx, { ...common(recorded, entry), phase: entry.phase }), remark: null }
    }
    case 'temperature': return { entry: await insert(tx, { ...common(recorded, entry), temperatureK: entry.temperatureK }), remark: null }
    case 'gas-meter': return { entry: await insert(tx, { ...common(recorded, entry), gasMeterM3: entry.gasMeterM3 }), remark: null }
    case 'note': return { entry: await insert(tx, common(recorded, entry)), remark: null }
  }
}

async function recordLevel(tx: Database, recorded: RecordedRun, entry: Extract<RunEntryInput, { kind: 'level' }>) {
  const accounts = await findCryostatAccounts(tx, recorded.cryostat.id)
  const litres = litresFromLevel(recorded.cryostat.vesselCalibration, entry.levelPercent)
  const last = await lastContent(tx, recorded.run.id, entry.at)
  const hours = last ? (entry.at.getTime() - last.at.getTime()) / MS_PER_HOUR : 0
  const rate = last && hours >= SHORTEST_STRETCH_HOURS ? (last.litres - litres) / hours : null
  const judgement = rate === null ? null : judgeBoilOff(rate, await readUsualBoilOff(tx, recorded.cryostat.id), recorded.cryostat.name)
  const outsideUsual = judgement !== null && judgement.status !== 'usual' && judgement.status !== 'no-band'
  const row = await insert(tx, {
    ...common(recorded, entry), levelPercent: entry.levelPercent, liquidLitres: litres, boilOffLitresPerHour: rate !== null && rate >= 0 ? rate : null, outsideUsual,
  })
  await settleContent(tx, recorded, accounts, row, litres)
  return { entry: row, remark: judgement?.why ?? null }
}

async function recordTransfer(tx: Database, recorded: RecordedRun, entry: Extract<RunEntryInput, { kind: 'transfer' }>) {
  if (entry.startedAt > entry.at) throw new DomainError('invalid', 'The transfer ends before it starts. Correct one of the two times.', ['startedAt'])
  const accounts = await findCryostatAccounts(tx, recorded.cryostat.id)
  const dewar = await findDewar(tx, entry.fromAccountId)
  const { vesselCalibration, recoveryFraction } = recorded.cryostat
  const before = litresFromLevel(vesselCalibration, entry.levelBeforePercent)
  const after = litresFromLevel(vesselCalibration, entry.levelAfterPercent)
  if (after < before) throw new DomainError('invalid', 'The level fell during the transfer. Check both levels; if it really fell, record them as level readings.', ['levelAfterPercent'])
  if (after - before > entry.drawnLitres) throw new DomainError('invalid', 'The cryostat gained more than the dewar gave. Check the litres drawn and both levels.', ['drawnLitres'])
  await lastContent(tx, recorded.run.id, entry.startedAt)
  const row = await insert(tx, {
    ...common(recorded, entry), startedAt: entry.startedAt, fromAccountId: entry.fromAccountId, drawnLitres: entry.drawnLitres, beforeLitres: before, liquidLitres: after, levelPercent: entry.levelAfterPercent,
  })
  await settleContent(tx, recorded, accounts, row, before)
  const takenMg = heliumMgFromLitres(entry.drawnLitres)
  const arrivedMg = heliumMgFromLitres(after) - heliumMgFromLitres(before)
  const posted = transferEntry({
    from: dewar, to: accounts.cryostat, recovery: accounts.recovery, lost: accounts.lost, takenMg, arrivedMg, recoveredMg: Math.round((takenMg - arrivedMg) * recoveryFraction),
  })
  checkCovered(posted, [dewar, accounts.cryostat, accounts.recovery, accounts.lost], new Map([[dewar.accountId, dewar.balanceMg]]))
  await postHeliumEntry(tx, posted, facts(recorded, row, `Transfer from ${dewar.name}`))
  return { entry: row, remark: null }
}

/** Brings the books of the vessel to what it holds: boil-off when it lost, a stock-take when the gauge reads higher. */
async function settleContent(tx: Database, recorded: RecordedRun, accounts: CryostatAccounts, row: Entry, litres: number) {
  const bookMg = (await readHeliumBalances(tx)).find(account => account.id === accounts.cryostat.accountId)?.balanceMg ?? 0
  const countedMg = heliumMgFromLitres(litres)
  if (countedMg < bookMg) {
    const gasMg = bookMg - countedMg
    const posted = boilOffEntry({ vessel: accounts.cryostat, recovery: accounts.recovery, lost: accounts.lost, gasMg, recoveredMg: Math.round(gasMg * recorded.cryostat.recoveryFraction) })
    await postHeliumEntry(tx, posted, facts(recorded, row, 'Boil-off'))
    return
  }
  const posted = stockTakeEntry({ account: accounts.cryostat, lost: accounts.lost, bookMg, countedMg, reason: 'The level reads higher than the books, without a logged transfer.' })
  if (posted) await postHeliumEntry(tx, posted, facts(recorded, row, 'Level above the books'))
}

/** What the vessel held at the run's last reading or transfer; levels are recorded in order of time. */
async function lastContent(tx: Database, runId: string, at: Date): Promise<{ at: Date, litres: number } | null> {
  const [row] = await tx.select({ at: runEntries.at, litres: runEntries.liquidLitres }).from(runEntries)
    .where(and(eq(runEntries.runId, runId), isNotNull(runEntries.liquidLitres))).orderBy(desc(runEntries.at), desc(runEntries.id)).limit(1)
  if (!row) return null
  if (row.at > at) throw new DomainError('conflict', 'A later level is on the sheet already, and the helium was booked by it. Enter a time after it, or write this one as a note.', ['at'])
  return { at: row.at, litres: row.litres ?? 0 }
}

async function lastEntry(tx: Database, runId: string, kind: Entry['kind'], at: Date): Promise<Entry | undefined> {
  const [row] = await tx.select().from(runEntries).where(and(eq(runEntries.runId, runId), eq(runEntries.kind, kind), lte(runEntries.at, at)))
    .orderBy(desc(runEntries.at), desc(runEntries.id)).limit(1)
  return row
}

function common({ run, actor }: RecordedRun, entry: RunEntryInput): NewEntry {
  return { runId: run.id, kind: entry.kind, at: entry.at, recordedBy: actor.personId, clientKey: entry.clientKey, note: entry.note ?? '' }
}

async function insert(tx: Database, values: NewEntry): Promise<Entry> {
  const [row] = await tx.insert(runEntries).values(values).returning()
  return row!
}

function facts({ run, actor }: RecordedRun, row: Entry, reason: string) {
  return { at: row.at, reason, runId: run.id, entryId: row.id, recordedBy: actor.personId }
}
