import { eq } from 'drizzle-orm'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { OpenDatabase } from '#server/db/client'
import { auditEvents, closures, cryostats } from '#server/db/schema'
import { createClosure } from '#server/services/closures/create-closure'
import { deleteClosure } from '#server/services/closures/delete-closure'
import { actorOf, insertFacilityRow, piOf } from '../support/board-rows'
import { DRIVERS, openTestDatabase } from '../support/database'
import { insertTestFacility, insertTestRun, type TestFacility } from '../support/rows'

const now = new Date('2027-05-06T08:00:00Z')

describe.each(DRIVERS)('closures, on %s', (driver) => {
  let open: OpenDatabase
  let facility: TestFacility
  const close = (from: string, to: string, actor = actorOf('manager', facility.personId)) =>
    createClosure(open.db, { cryostatId: facility.cryostatId, startsAt: new Date(from), endsAt: new Date(to), reason: 'Pump service', actor, now })

  beforeAll(async () => {
    open = await openTestDatabase(driver)
    await insertFacilityRow(open.db)
    facility = await insertTestFacility(open.db)
  })
  afterAll(() => open.close())

  it('closes days, writes who did it, and names the requests on them', async () => {
    const asked = await insertTestRun(open.db, facility, 'asked', '2027-05-14T08:00Z', '2027-05-16T08:00Z')
    const closure = await close('2027-05-13T22:00Z', '2027-05-16T22:00Z')
    expect(closure.askedRunNumbers).toEqual([asked.number])
    expect(await open.db.select().from(auditEvents).where(eq(auditEvents.objectId, closure.id))).toMatchObject([{ action: 'closure:write', actorId: facility.personId }])
  })

  it('names the run it collides with, and leaves nothing behind', async () => {
    const run = await insertTestRun(open.db, facility, 'confirmed', '2027-05-20T08:00Z', '2027-05-22T16:00Z')
    const [cryostat] = await open.db.select().from(cryostats).where(eq(cryostats.id, facility.cryostatId))
    await expect(close('2027-05-21T22:00Z', '2027-05-23T22:00Z')).rejects.toMatchObject({
      code: 'conflict', path: ['startsAt'],
      message: expect.stringMatching(new RegExp(`^${cryostat!.name} is held by run ${String(run.number).padStart(4, '0')} \\(Copper, Group \\d+ group\\) Thu 20 May 10:00 – Sat 22 May 18:00\\. Choose other days`)),
    })
    expect(await open.db.select().from(closures)).toHaveLength(1)
  })

  it('names the closure it collides with', async () => {
    await expect(close('2027-05-15T00:00Z', '2027-05-15T12:00Z')).rejects.toThrow(/is closed Fri 14 May 00:00 – Mon 17 May 00:00 \(Pump service\)\. Choose other days/)
  })

  it('refuses days that are over, and people who may not', async () => {
    await expect(close('2027-05-01T00:00Z', '2027-05-02T00:00Z')).rejects.toMatchObject({ code: 'invalid', path: ['endsAt'] })
    await expect(close('2027-06-01T00:00Z', '2027-06-02T00:00Z', piOf(facility))).rejects.toMatchObject({ code: 'not-allowed' })
    await expect(close('2027-06-01T00:00Z', '2027-06-02T00:00Z', actorOf('operator'))).rejects.toMatchObject({ code: 'not-allowed' })
  })

  it('takes back a closure to come, ends one under way, and leaves one that is over', async () => {
    const { id } = await close('2027-06-01T00:00Z', '2027-06-03T00:00Z')
    const actor = () => actorOf('manager', facility.personId)
    await deleteClosure(open.db, { closureId: id, actor: actor(), now })
    expect(await open.db.select().from(closures).where(eq(closures.id, id))).toHaveLength(0)
    await expect(deleteClosure(open.db, { closureId: id, actor: actor(), now })).rejects.toMatchObject({ code: 'not-found' })

    const [running] = await open.db.select().from(closures)
    const during = new Date('2027-05-15T06:00:00Z')
    await deleteClosure(open.db, { closureId: running!.id, actor: actor(), now: during })
    expect(await open.db.select().from(closures)).toMatchObject([{ during: { startsAt: new Date('2027-05-13T22:00Z'), endsAt: during } }])
    // The freed days can be held again.
    await insertTestRun(open.db, facility, 'confirmed', '2027-05-15T06:00Z', '2027-05-16T06:00Z')
    await expect(deleteClosure(open.db, { closureId: running!.id, actor: actor(), now: new Date('2027-05-18T00:00Z') })).rejects.toMatchObject({ code: 'conflict' })
  })
})
