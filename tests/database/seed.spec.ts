import { createHash } from 'node:crypto'
import { mkdtempSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, describe, expect, it } from 'vitest'
import { openFileStore } from '#server/adapters/storage/files'
import { seedDemo } from '#server/db/seed'
import { type Driver, openTestDatabase } from '../support/database'

const NOW = new Date('2026-11-17T10:30:00Z')
const folder = mkdtempSync(join(tmpdir(), 'holdtime-seed-'))
afterAll(() => rmSync(folder, { recursive: true, force: true }))
const font = (name: string) => readFileSync(new URL(`../../assets/fonts/IBMPlexSans_${name}.ttf`, import.meta.url))

/** What the seed made, without ids: runs, lines of the sheets, helium, invoices, results. */
async function seeded(driver: Driver) {
  const open = await openTestDatabase(driver)
  try {
    await seedDemo(open.db, { seed: 4, now: NOW, files: openFileStore({ dataFolder: join(folder, driver) }), fonts: { regular: font('400Regular'), medium: font('500Medium'), semiBold: font('600SemiBold') } })
    const rows = async (text: string) => (await open.query(text)).rows
    const facts = {
      runs: await rows('select r.number, r.title, c.name, r.state, extract(epoch from lower(slot))::int as starts, extract(epoch from upper(slot))::int as ends, r.cut_short from runs r join cryostats c on c.id = r.cryostat_id order by r.number'),
      lines: await rows('select kind, count(*)::int as n, round(sum(coalesce(liquid_litres, 0))::numeric, 3)::text as litres, round(sum(coalesce(temperature_k, 0))::numeric, 3)::text as kelvin from run_entries group by kind order by kind'),
      helium: await rows('select a.name, coalesce(sum(p.amount_mg), 0)::text as mg from helium_accounts a left join helium_postings p on p.account_id = a.id group by a.name order by a.name'),
      invoices: await rows('select number, total_minor::int as total, due_minor::int as due from invoices order by year, sequence'),
      results: await rows('select verdict, count(*)::int as n from analyses group by verdict order by verdict'),
      people: await rows('select class, count(*)::int as n from groups group by class order by class'),
      unbalanced: await rows('select movement_id from helium_postings group by movement_id having sum(amount_mg) <> 0'),
      overdrawn: await rows('select a.name from helium_accounts a join helium_postings p on p.account_id = a.id where a.kind in (\'dewar\', \'cryostat\', \'recovery\') group by a.name having sum(p.amount_mg) < 0'),
    }
    return facts
  }
  finally {
    await open.close()
  }
}

describe('the seed', () => {
  it('makes the same facility on both databases, with two years behind it and a living present', async () => {
    const [onPglite, onPostgres] = [await seeded('pglite'), await seeded('postgres')]
    const digest = (facts: object) => createHash('sha256').update(JSON.stringify(facts)).digest('hex')
    expect(digest(onPglite)).toBe(digest(onPostgres))

    const states = onPglite.runs.map(run => run.state)
    for (const state of ['asked', 'approved', 'confirmed', 'running', 'settled']) expect(states).toContain(state)
    expect(new Set(onPglite.runs.map(run => run.name)).size).toBe(4)
    expect(onPglite.people.map(group => group.class)).toEqual(['academic', 'industry', 'internal'])
    expect(onPglite.results.map(result => result.verdict)).toEqual(['caution', 'fail', 'ok'])
    expect(NOW.getTime() / 1000 - Math.min(...onPglite.runs.map(run => Number(run.starts)))).toBeGreaterThan(700 * 86_400)
    expect(onPglite.unbalanced).toEqual([])
    expect(onPglite.overdrawn).toEqual([])
  }, 240_000)
})
