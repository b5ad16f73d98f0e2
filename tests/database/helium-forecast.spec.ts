import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { OpenDatabase } from '#server/db/client'
import { heliumDeliveries } from '#server/db/schema'
import { readHeliumForecast } from '#server/services/helium/forecast-queries'
import { actorOf, insertFacilityRow, insertStockAccounts, moveHelium, piOf } from '../support/board-rows'
import { DRIVERS, openTestDatabase } from '../support/database'
import { insertTestFacility, insertTestRun, type TestFacility } from '../support/rows'

const range = { from: '2027-05-03', to: '2027-05-17', now: new Date('2027-05-06T08:00:00Z') }

describe.each(DRIVERS)('the helium strip, on %s', (driver) => {
  let open: OpenDatabase
  let facility: TestFacility

  beforeAll(async () => {
    open = await openTestDatabase(driver)
    await insertFacilityRow(open.db)
    facility = await insertTestFacility(open.db)
    const accounts = await insertStockAccounts(open.db)
    await moveHelium(open.db, accounts.supplier, accounts.dewar, 250, '2027-04-01T08:00Z')
    await moveHelium(open.db, accounts.dewar, accounts.lost, 40, '2027-04-20T08:00Z')
    await moveHelium(open.db, accounts.dewar, accounts.lost, 50, '2027-05-04T08:00Z')
    // Each draws 40 L while cooling to base and 20 L while measuring.
    await insertTestRun(open.db, facility, 'confirmed', '2027-05-08T08:00Z', '2027-05-10T08:00Z')
    await insertTestRun(open.db, facility, 'asked', '2027-05-12T08:00Z', '2027-05-14T08:00Z')
    await insertTestRun(open.db, facility, 'finished', '2027-04-12T08:00Z', '2027-04-14T08:00Z')
    await open.db.insert(heliumDeliveries).values([
      { dueAt: new Date('2027-05-16T08:00Z'), litres: 100, dewarAccountId: accounts.dewar, supplierReference: 'A' },
      { dueAt: new Date('2027-05-05T08:00Z'), litres: 60, dewarAccountId: accounts.dewar, supplierReference: 'late' },
    ])
  })
  afterAll(() => open.close())

  it('draws the past by the books, from the first day until now', async () => {
    const { history, reserveLitres } = await readHeliumForecast(open.db, { actor: actorOf('operator'), ...range })
    expect(reserveLitres).toBe(80)
    expect(history).toEqual([
      { at: '2027-05-02T22:00:00.000Z', litres: 210 }, { at: '2027-05-04T08:00:00.000Z', litres: 210 },
      { at: '2027-05-04T08:00:00.000Z', litres: 160 }, { at: '2027-05-06T08:00:00.000Z', litres: 160 },
    ])
  })

  it('carries held runs and deliveries forward, and asked runs as well in the other line', async () => {
    const { detail } = await readHeliumForecast(open.db, { actor: actorOf('manager'), ...range })
    const at = (points: { at: string, litres: number }[], instant: string) => points.filter(point => point.at === instant).at(-1)?.litres
    // The run stops drawing at 10 May 00:00 UTC: 160 L less its 60 L, less 0.01 × 160 L/d of the dewars over 88 h.
    expect(at(detail!.held.points, '2027-05-10T00:00:00.000Z')).toBeCloseTo(160 - 60 - 1.6 * 88 / 24, 1)
    // Both runs and the delivery, ten days on: 160 − 16 − 120 + 100.
    expect(at(detail!.allAsked.points, '2027-05-16T08:00:00.000Z')).toBeCloseTo(124, 1)
    expect(detail).toMatchObject({ onHandLitres: 160, askedCount: 1, deliveries: [{ litres: 60, isOverdue: true }, { litres: 100, isOverdue: false }] })
  })

  it('names the day of the shortage, with and without the asked runs', async () => {
    const { detail } = await readHeliumForecast(open.db, { actor: actorOf('manager'), ...range })
    // Held: never likely short (84 L just before the delivery of 16 May), but the low end, 1.2816 √(3.2² + 9²) = 12.24 L under
    // the line, meets 80 L where 160 − 60 − 1.6 d − 12.24 = 80, so d = 4.85 days after 6 May 08:00 UTC.
    expect(detail!.held.likelyShortAt).toBeNull()
    expect(detail!.held.lowShortAt).toMatch(/^2027-05-11T04:/)
    expect(detail!.held.sentence).toContain('may fall under it on Tuesday 11 May 2027')
    // With the asked run: 160 − 60 − 9.6 is 90.4 L on 12 May, and 80 L is passed while that run cools on 13 May, 00:00 to 08:00 UTC.
    expect(detail!.allAsked.likelyShortAt).toMatch(/^2027-05-13T0[0-7]/)
    expect(detail!.allAsked.sentence).toContain('Thursday 13 May 2027')
  })

  it('gives people without a facility role the line alone', async () => {
    const reply = await readHeliumForecast(open.db, { actor: piOf(facility), ...range })
    expect(reply.detail).toBeNull()
    // Straight but for the run's two draws, the delivery's step and the two ends.
    expect(reply.line).toHaveLength(8)
    expect(Object.keys(reply.line[0]!)).toEqual(['at', 'litres'])
  })

  it('has no forecast for days that are over, and no past for days to come', async () => {
    const past = await readHeliumForecast(open.db, { actor: actorOf('manager'), now: range.now, from: '2027-04-05', to: '2027-04-19' })
    expect(past).toMatchObject({ line: [], detail: null })
    expect(past.history.at(-1)).toEqual({ at: '2027-04-18T22:00:00.000Z', litres: 250 })
    const future = await readHeliumForecast(open.db, { actor: piOf(facility), now: range.now, from: '2027-05-10', to: '2027-05-24' })
    expect(future.history).toEqual([])
    expect(Date.parse(future.line[0]!.at)).toBeLessThanOrEqual(Date.parse('2027-05-09T22:00:00Z'))
  })
})
