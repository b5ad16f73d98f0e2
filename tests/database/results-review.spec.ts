import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Actor } from '#shared/access/rules'
import { signOffs } from '#server/db/schema'
import type { OpenDatabase } from '#server/db/client'
import { addComment } from '#server/services/results/add-comment'
import { getAnalysis } from '#server/services/results/get-analysis'
import { listResults } from '#server/services/results/list-results'
import { signOff } from '#server/services/results/sign-off'
import { insertFacilityRow } from '../support/board-rows'
import { DRIVERS, openTestDatabase } from '../support/database'
import { insertTestAnalysis, insertTestDataset } from '../support/results'
import { insertTestFacility, insertTestRun, type TestFacility } from '../support/rows'

const NOW = new Date('2027-01-10T08:00Z')

describe.each(DRIVERS)('reviewing results, on %s', (driver) => {
  let open: OpenDatabase
  let facility: TestFacility
  let run: { id: string }
  let pi: Actor, member: Actor, operator: Actor, otherPi: Actor, manager: Actor

  beforeAll(async () => {
    open = await openTestDatabase(driver)
    await insertFacilityRow(open.db)
    facility = await insertTestFacility(open.db)
    const other = await insertTestFacility(open.db)
    run = await insertTestRun(open.db, facility, 'finished', '2027-01-04T08:00Z', '2027-01-08T08:00Z')
    const actor = (more: Partial<Actor>): Actor => ({ personId: facility.personId, isManager: false, isOperator: false, memberships: [], ...more })
    pi = actor({ memberships: [{ groupId: facility.groupId, role: 'pi' }] })
    member = actor({ memberships: [{ groupId: facility.groupId, role: 'member' }] })
    operator = actor({ isOperator: true })
    manager = actor({ isManager: true })
    otherPi = actor({ personId: other.personId, memberships: [{ groupId: other.groupId, role: 'pi' }] })
  })
  afterAll(() => open.close())

  const dataset = (more = {}) => insertTestDataset(open.db, run, facility.personId, more)
  const analysis = (of: { id: string }, verdict: 'ok' | 'caution' | 'fail', at?: Date) => insertTestAnalysis(open.db, of, facility.personId, verdict, at)
  const sign = (analysisId: string, actor: Actor, accepted = true, reason = '') => signOff(open.db, { analysisId, accepted, reason, actor, now: NOW })

  it('lets the PI of the group and the manager sign, and nobody else', async () => {
    const of = await analysis(await dataset(), 'ok')
    await expect(sign(of.id, member)).rejects.toMatchObject({ code: 'not-allowed' })
    await expect(sign(of.id, operator)).rejects.toMatchObject({ code: 'not-allowed' })
    await expect(sign(of.id, otherPi)).rejects.toMatchObject({ code: 'not-found' })
    expect(await open.db.select().from(signOffs)).toHaveLength(0)
    await sign(of.id, pi)
    await sign(of.id, manager, false, 'Addenda are missing.')
    const view = await getAnalysis(open.db, { analysisId: of.id, actor: member })
    expect(view.signOffs.map(({ accepted, reason }) => [accepted, reason])).toEqual([[true, ''], [false, 'Addenda are missing.']])
    expect(view.maySign).toBe(false)
  })

  it('asks for words when a result does not pass, or is not accepted', async () => {
    const caution = await analysis(await dataset(), 'caution')
    await expect(sign(caution.id, pi)).rejects.toMatchObject({ code: 'invalid', path: ['reason'] })
    await expect(sign(caution.id, pi, false)).rejects.toMatchObject({ code: 'invalid', path: ['reason'] })
    await sign(caution.id, pi, true, 'The window is a little warm; γ does not move.')
  })

  it('signs the analysis that was seen: after a newer one, the newer must be signed', async () => {
    const of = await dataset()
    const first = await analysis(of, 'ok', new Date('2027-01-09T08:00Z'))
    await sign(first.id, pi)
    const second = await analysis(of, 'ok', new Date('2027-01-09T09:00Z'))
    await expect(sign(first.id, pi, false, 'Wrong window.')).rejects.toMatchObject({ code: 'conflict' })
    const listed = () => listResults(open.db, { actor: pi, search: of.originalName }).then(list => list.items[0]?.latest)
    expect(await listed()).toMatchObject({ analysisId: second.id, signed: null })
    await sign(second.id, pi)
    expect(await listed()).toMatchObject({ analysisId: second.id, signed: 'accepted' })
  })

  it('signs once when pressed twice', async () => {
    const of = await analysis(await dataset(), 'ok')
    const [one, two] = [await sign(of.id, pi), await sign(of.id, pi)]
    expect(one).toEqual(two)
  })

  it('keeps remarks in order, from those who may see the analysis', async () => {
    const of = await analysis(await dataset(), 'ok')
    const remark = (text: string, actor: Actor, at: string) => addComment(open.db, { analysisId: of.id, text, actor, now: new Date(at) })
    await remark('Which thermometer?', pi, '2027-01-10T08:00Z')
    await remark('RX-2, calibrated in May.', operator, '2027-01-10T08:05Z')
    await expect(remark('Hello', otherPi, '2027-01-10T08:06Z')).rejects.toMatchObject({ code: 'not-found' })
    expect((await getAnalysis(open.db, { analysisId: of.id, actor: pi })).comments.map(each => each.text)).toEqual(['Which thermometer?', 'RX-2, calibrated in May.'])
  })

  it('lists by verdict and signature, own groups only, with the numbers of the newest analysis', async () => {
    const failing = await dataset({ originalName: 'spoiled_100%.csv' })
    await analysis(failing, 'fail')
    await dataset({ originalName: 'unmapped.csv', mapping: null, temperatureK: null, heatCapacity: null, sigma: null })
    const list = (more: object, actor = pi) => listResults(open.db, { actor, ...more })
    const [shown] = (await list({ verdict: 'fail' })).items
    expect(shown).toMatchObject({ datasetId: failing.id, formula: 'Cu', mapped: true, pointCount: 2, latest: { verdict: 'fail', checkCounts: { ok: 1, caution: 0, fail: 1 }, gamma: { value: 0.693, standardError: 0.006 }, signed: null } })
    expect((await list({ search: '100%' })).items).toHaveLength(1)
    expect((await list({ search: 'unmapped' })).items[0]).toMatchObject({ mapped: false, pointCount: null, latest: null })
    expect((await list({ verdict: 'none' })).items.map(item => item.originalName)).toEqual(['unmapped.csv'])
    expect((await list({ signed: 'yes' })).items.every(item => item.latest?.signed)).toBe(true)
    expect((await list({}, otherPi)).items).toEqual([])
    expect((await list({}, manager)).items.length).toBeGreaterThan(5)
  })

  it('pages through everything once, also rows of the same instant', async () => {
    const instant = new Date('2026-12-01T00:00:00.123Z')
    const before = (await listResults(open.db, { actor: manager })).items.length
    for (let index = 0; index < 60; index += 1) await dataset({ createdAt: instant })
    const first = await listResults(open.db, { actor: manager })
    const second = await listResults(open.db, { actor: manager, cursor: first.nextCursor! })
    expect(first.items).toHaveLength(50)
    expect(second.nextCursor).toBeNull()
    expect(new Set([...first.items, ...second.items].map(item => item.datasetId)).size).toBe(60 + before)
    await expect(listResults(open.db, { actor: manager, cursor: 'x' })).rejects.toMatchObject({ code: 'invalid' })
  })
})
