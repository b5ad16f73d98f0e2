import { eq, sql } from 'drizzle-orm'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { OpenDatabase } from '#server/db/client'
import { closures, heliumAccounts, heliumMovements, heliumPostings, invoiceLines, invoices, rateCards, runs } from '#server/db/schema'
import { DRIVERS, openTestDatabase } from '../support/database'
import { insertTestFacility, insertTestRun, type TestFacility } from '../support/rows'

/** The constraint that refused a statement, from the driver's error under drizzle's. */
async function refusedBy(statement: Promise<unknown>): Promise<string | undefined> {
  try {
    await statement
    return undefined
  }
  catch (error) {
    let cause = error as { cause?: unknown, constraint?: string }
    while (cause.constraint === undefined && cause.cause) cause = cause.cause as typeof cause
    return cause.constraint
  }
}

describe.each(DRIVERS)('what the database refuses, on %s', (driver) => {
  let open: OpenDatabase
  let facility: TestFacility

  beforeAll(async () => {
    open = await openTestDatabase(driver)
    facility = await insertTestFacility(open.db)
  })
  afterAll(() => open.close())

  it('refuses a second holding run on the same days, and lets asked runs compete', async () => {
    const held = await insertTestRun(open.db, facility, 'confirmed', '2027-01-04T08:00Z', '2027-01-08T08:00Z')
    const rival = await insertTestRun(open.db, facility, 'asked', '2027-01-05T08:00Z', '2027-01-09T08:00Z')
    expect(await refusedBy(open.db.update(runs).set({ state: 'approved' }).where(eq(runs.id, rival.id)))).toBe('cryostat_holds_no_overlap')
    await open.db.update(runs).set({ state: 'withdrawn' }).where(eq(runs.id, held.id))
    await open.db.update(runs).set({ state: 'approved' }).where(eq(runs.id, rival.id))
  })

  it('lets one run start at the instant at which another ends', async () => {
    await insertTestRun(open.db, facility, 'confirmed', '2027-02-01T08:00Z', '2027-02-03T08:00Z')
    await insertTestRun(open.db, facility, 'confirmed', '2027-02-03T08:00Z', '2027-02-05T08:00Z')
  })

  it('refuses a closure over a held run, and a run over a closure', async () => {
    const during = (from: string, to: string) => ({ startsAt: new Date(from), endsAt: new Date(to) })
    const closure = (span: { startsAt: Date, endsAt: Date }) => open.db.insert(closures).values({ cryostatId: facility.cryostatId, during: span, reason: 'Pump service', createdBy: facility.personId })
    expect(await refusedBy(closure(during('2027-02-02T00:00Z', '2027-02-02T12:00Z')))).toBe('cryostat_holds_no_overlap')
    await closure(during('2027-03-01T00:00Z', '2027-03-03T00:00Z'))
    expect(await refusedBy(insertTestRun(open.db, facility, 'running', '2027-03-02T00:00Z', '2027-03-04T00:00Z'))).toBe('cryostat_holds_no_overlap')
    await open.db.delete(closures)
    await insertTestRun(open.db, facility, 'running', '2027-03-02T00:00Z', '2027-03-04T00:00Z')
  })

  it('refuses states outside the life of a run, and steps that skip one', async () => {
    expect(await refusedBy(insertTestRun(open.db, facility, 'paused' as 'asked', '2027-04-01T00:00Z', '2027-04-02T00:00Z'))).toBe('runs_state')
    const asked = await insertTestRun(open.db, facility, 'asked', '2027-04-01T00:00Z', '2027-04-02T00:00Z')
    expect(await refusedBy(open.db.update(runs).set({ state: 'running' }).where(eq(runs.id, asked.id)))).toBe('runs_life')
  })

  it('refuses helium that comes from nowhere', async () => {
    const [from, to] = await open.db.insert(heliumAccounts).values([{ kind: 'dewar', name: 'Dewar A' }, { kind: 'cryostat', name: 'Bath' }]).returning()
    const move = (amounts: [number, number]) => open.db.transaction(async (tx) => {
      const [movement] = await tx.insert(heliumMovements).values({ at: new Date(), reason: 'Transfer' }).returning()
      await tx.insert(heliumPostings).values([{ movementId: movement!.id, accountId: from!.id, amountMg: amounts[0] }, { movementId: movement!.id, accountId: to!.id, amountMg: amounts[1] }])
    })
    expect(await refusedBy(move([-5_000_000, 4_999_999]))).toBe('helium_movements_balanced')
    await move([-5_000_000, 5_000_000])
    expect(await refusedBy(open.db.insert(heliumMovements).values({ at: new Date(), reason: 'Empty' }))).toBe('helium_movements_balanced')
    expect(await refusedBy(open.db.update(heliumPostings).set({ amountMg: 1 }))).toBe('helium_postings_immutable')
  })

  it('numbers invoices without a gap, also after one is rolled back, and never lets them be edited', async () => {
    const issue = (issuedAt: string, sequence = 0, amount = 1000) => open.db.transaction(async (tx) => {
      const run = await insertTestRun(tx, facility, 'finished', '2026-05-01T00:00Z', '2026-05-02T00:00Z')
      const [invoice] = await tx.insert(invoices).values({
        kind: 'invoice', year: 0, sequence, number: '', runId: run.id, groupId: facility.groupId, issuedAt: new Date(issuedAt), issuedOn: issuedAt.slice(0, 10), suppliedOn: '2026-05-02',
        seller: { name: 'S', addressLines: [], email: 's@skerry.example', vatId: null }, buyer: { name: 'B', addressLines: [], email: 'b@skerry.example', vatId: null },
        currency: 'EUR', vatBasisPoints: 2500, reverseCharge: false, netMinor: 1000, vatMinor: 250, totalMinor: 1250, prepaidMinor: 0, dueMinor: 1250, paymentText: '',
      }).returning()
      await tx.insert(invoiceLines).values({ invoiceId: invoice!.id, position: 1, kind: 'cooldown', label: 'Cooldown', unit: 'run', quantity: 1, unitPriceMinor: amount, netMinor: amount })
      return invoice!.number
    })
    expect(await issue('2026-06-01T10:00Z')).toBe('2026-0001')
    expect(await refusedBy(issue('2026-06-02T10:00Z', 0, 999))).toBe('invoices_lines_add_up')
    expect(await refusedBy(issue('2026-06-02T10:00Z', 7))).toBe('invoices_no_gap')
    expect(await issue('2026-06-02T10:00Z')).toBe('2026-0002')
    expect(await refusedBy(issue('2026-06-01T12:00Z'))).toBe('invoices_in_date_order')
    expect(await issue('2027-01-02T10:00Z')).toBe('2027-0001')
    expect(await refusedBy(open.db.update(invoices).set({ netMinor: 1 }))).toBe('invoices_immutable')
    expect(await refusedBy(open.db.delete(invoiceLines))).toBe('invoice_lines_immutable')
    expect(await refusedBy(open.db.execute(sql`update invoice_counters set last_sequence = 9`))).toBe('invoice_counters_guarded')
  })

  it('refuses a negative amount and a change of an issued rate card', async () => {
    expect(await refusedBy(open.db.execute(sql`update rate_card_prices set per_litre_minor = -1`))).toBe('rate_card_prices_not_negative')
    await open.db.update(rateCards).set({ issuedAt: new Date() }).where(eq(rateCards.id, facility.rateCardId))
    expect(await refusedBy(open.db.update(rateCards).set({ name: 'Other' }).where(eq(rateCards.id, facility.rateCardId)))).toBe('rate_cards_issued')
    expect(await refusedBy(open.db.execute(sql`update rate_card_prices set per_litre_minor = 1`))).toBe('rate_cards_issued')
  })
})
