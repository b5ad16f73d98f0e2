import { eq } from 'drizzle-orm'
import { v7 as uuidv7 } from 'uuid'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { OpenDatabase } from '#server/db/client'
import { closures, groups, runEntries, runs } from '#server/db/schema'
import { readBoardMonth } from '#server/services/board/month'
import { readBoard } from '#server/services/board/queries'
import { actorOf, insertFacilityRow, piOf } from '../support/board-rows'
import { DRIVERS, openTestDatabase } from '../support/database'
import { insertTestFacility, insertTestRun, type TestFacility } from '../support/rows'

const range = { from: '2027-05-03', to: '2027-05-17', now: new Date('2027-05-06T08:05:00Z') }

describe.each(DRIVERS)('the board, on %s', (driver) => {
  let open: OpenDatabase
  let alder: TestFacility
  let cedar: TestFacility

  beforeAll(async () => {
    open = await openTestDatabase(driver)
    await insertFacilityRow(open.db)
    alder = await insertTestFacility(open.db)
    cedar = { ...await insertTestFacility(open.db), cryostatId: alder.cryostatId }
  })
  afterAll(() => open.close())

  it('shows runs that overlap the days, with slot, phases and group, and leaves out the rest', async () => {
    const running = await insertTestRun(open.db, alder, 'running', '2027-05-02T08:00Z', '2027-05-06T08:00Z')
    await insertTestRun(open.db, alder, 'withdrawn', '2027-05-08T08:00Z', '2027-05-09T08:00Z')
    // Ends at the very instant at which the facility's Monday begins (22:00 UTC is midnight in Oslo).
    await insertTestRun(open.db, cedar, 'finished', '2027-04-30T08:00Z', '2027-05-02T22:00Z')
    const board = await readBoard(open.db, { actor: actorOf('operator'), ...range })
    expect(board).toMatchObject({ timeZone: 'Europe/Oslo', from: '2027-05-03', to: '2027-05-17', now: '2027-05-06T08:05:00.000Z' })
    expect(board.lanes.map(lane => lane.id)).toContain(alder.cryostatId)
    const [group] = await open.db.select().from(groups).where(eq(groups.id, alder.groupId))
    expect(board.runs).toMatchObject([{
      id: running.id, number: running.number, title: 'Copper', groupName: group!.name, state: 'running', startsAt: '2027-05-02T08:00:00.000Z', endsAt: '2027-05-06T08:00:00.000Z',
      phasesStartAt: '2027-05-02T08:00:00.000Z', lowestK: 2, heliumLitres: 60,
      phases: [{ phase: 'prepare', hours: 4 }, { phase: 'cool-to-77', hours: 12 }, { phase: 'cool-to-base', hours: 8 }, { phase: 'measure', hours: 16 }, { phase: 'warm-up', hours: 6 }, { phase: 'turn-round', hours: 2 }],
    }])
  })

  it('shows people of other groups that days are taken or asked for, and nothing else of a run', async () => {
    await insertTestRun(open.db, cedar, 'confirmed', '2027-05-10T08:00Z', '2027-05-12T08:00Z')
    await insertTestRun(open.db, cedar, 'asked', '2027-05-13T08:00Z', '2027-05-14T08:00Z')
    const board = await readBoard(open.db, { actor: piOf(alder), ...range })
    expect(board.desk).toBeNull()
    const closed = { id: null, number: null, groupName: null, lowestK: null, heliumLitres: null, phases: [], cryostatId: alder.cryostatId }
    expect(board.runs.slice(1)).toEqual([
      { ...closed, title: 'Taken', state: 'taken', startsAt: '2027-05-10T08:00:00.000Z', endsAt: '2027-05-12T08:00:00.000Z', phasesStartAt: '2027-05-10T08:00:00.000Z' },
      { ...closed, title: 'Asked for', state: 'asked', startsAt: '2027-05-13T08:00:00.000Z', endsAt: '2027-05-14T08:00:00.000Z', phasesStartAt: '2027-05-13T08:00:00.000Z' },
    ])
    expect(JSON.stringify(board)).not.toContain(cedar.groupId)
    expect(board.runs[0]).toMatchObject({ title: 'Copper', state: 'running' })
  })

  it('gives managers the requests that wait, operators only the readings', async () => {
    const manager = await readBoard(open.db, { actor: actorOf('manager'), ...range })
    expect(manager.desk?.requests).toMatchObject([{ title: 'Copper', startsAt: '2027-05-13T08:00:00.000Z' }])
    const operator = await readBoard(open.db, { actor: actorOf('operator'), ...range })
    expect(operator.desk?.requests).toBeNull()
    // Four hours after the run's start while nothing was read.
    expect(operator.desk?.readings).toMatchObject([{ dueAt: '2027-05-02T12:00:00.000Z', last: null }])
  })

  it('takes phases as logged, and the next reading from the last level', async () => {
    const [run] = await open.db.select().from(runs).where(eq(runs.state, 'running'))
    const entry = { runId: run!.id, recordedBy: alder.personId }
    await open.db.insert(runEntries).values([
      { ...entry, kind: 'phase', phase: 'prepare', at: new Date('2027-05-02T09:00Z'), clientKey: uuidv7() },
      { ...entry, kind: 'phase', phase: 'cool-to-77', at: new Date('2027-05-02T15:00Z'), clientKey: uuidv7() },
      { ...entry, kind: 'level', levelPercent: 61, liquidLitres: 36.6, boilOffLitresPerHour: 0.42, at: new Date('2027-05-03T07:00Z'), clientKey: uuidv7() },
      { ...entry, kind: 'level', levelPercent: 60, liquidLitres: 36, at: new Date('2027-05-03T06:00Z'), clientKey: uuidv7() },
    ])
    const board = await readBoard(open.db, { actor: actorOf('operator'), ...range })
    expect(board.runs[0]).toMatchObject({ phasesStartAt: '2027-05-02T09:00:00.000Z' })
    expect(board.runs[0]?.phases.slice(0, 2)).toEqual([{ phase: 'prepare', hours: 6 }, { phase: 'cool-to-77', hours: 12 }])
    expect(board.desk?.readings).toMatchObject([{ dueAt: '2027-05-03T11:00:00.000Z', last: { levelPercent: 61, boilOffLitresPerHour: 0.42, outsideUsual: false } }])
  })

  it('shows a change at once, also one whose transaction was open while the board was read', async () => {
    const read = async () => (await readBoard(open.db, { actor: actorOf('operator'), from: '2027-06-07', to: '2027-06-21', now: range.now })).runs.map(run => run.number)
    expect(await read()).toEqual([])
    const first = await insertTestRun(open.db, alder, 'asked', '2027-06-08T08:00Z', '2027-06-10T08:00Z')
    expect(await read()).toEqual([first.number])
    // PGlite has one session, which an open transaction holds.
    const second = await open.db.transaction(async (tx) => {
      const run = await insertTestRun(tx, alder, 'asked', '2027-06-11T08:00Z', '2027-06-12T08:00Z')
      if (driver === 'postgres') expect(await read()).toEqual([first.number])
      return run
    })
    expect(await read()).toEqual([first.number, second.number])
    await open.db.update(runs).set({ state: 'withdrawn' }).where(eq(runs.id, first.id))
    expect(await read()).toEqual([second.number])
    await open.db.update(runs).set({ state: 'withdrawn' }).where(eq(runs.id, second.id))
  })

  it('shows two weeks from the facility\'s Monday when nobody says which days', async () => {
    // Sunday 23:30 UTC is Monday in Oslo.
    const board = await readBoard(open.db, { actor: actorOf('operator'), now: new Date('2027-05-09T23:30:00Z') })
    expect(board).toMatchObject({ from: '2027-05-10', to: '2027-05-24' })
  })

  it('gives each day of a month its free cryostats, with closures, at the facility\'s midnight', async () => {
    await open.db.insert(closures).values({ cryostatId: alder.cryostatId, during: { startsAt: new Date('2027-03-27T23:00Z'), endsAt: new Date('2027-03-28T22:00Z') }, reason: 'Pump service', createdBy: alder.personId })
    const month = await readBoardMonth(open.db, { actor: piOf(cedar), month: '2027-03' })
    expect(month.days).toHaveLength(31)
    const slug = month.lanes.find(lane => lane.id === alder.cryostatId)!.slug
    // The closure is the whole of Sunday 28 March, 23 h long.
    expect(month.days.filter(day => !day.free.includes(slug)).map(({ day }) => day)).toEqual(['2027-03-28'])
  })
})
