import type { FileStore } from '#server/adapters/storage/files'
import type { PdfFonts } from '#server/adapters/pdf/page'
import type { Database } from '#server/db/client'
import { rateCardPrices } from '#server/db/schema'
import { readFinishedRuns } from '#server/services/plan/history'
import { seedFacility } from './facility'
import { HeliumBooks } from './helium-books'
import { seedDeposits, seedInvoices } from './money'
import { seedPeople } from './people'
import { orderedHelium, presentRuns, seedClosures } from './present'
import { seededRandom } from './random'
import { seedRateCards } from './rates'
import { seedResults } from './results'
import { type RunFacts, type SeededRun, seedRuns } from './runs'
import { seedSamples } from './samples'
import { pastRuns } from './schedule'

/** What the seed is made with. */
export interface SeedOptions { seed: number, now: Date, files: FileStore, fonts: PdfFonts }

/** What the seed made, for those who sign in. */
export interface SeedReply { signIns: { as: string, email: string, password: string }[], runCount: number }

/**
 * Makes an invented facility: unlike cryostats, groups of the three classes, people of every role, two years of finished
 * runs and a living present. The same seed number and day give the same facility.
 *
 * @param db a migrated, empty database
 * @param options seed number, the instant that counts as today, and where files and fonts are
 */
export async function seedDemo(db: Database, { seed, now, files, fonts }: SeedOptions): Promise<SeedReply> {
  const random = seededRandom(seed)
  const facility = await seedFacility(db)
  const people = await seedPeople(db)
  const samples = await seedSamples(db, people)
  const cards = await seedRateCards(db, facility.facility.currency, now.getUTCFullYear())
  const facts: RunFacts = { people, cryostats: facility.cryostats, cards, prices: await db.select().from(rateCardPrices), dewarIds: facility.accounts.dewars, now }

  const past: SeededRun[] = []
  const running: SeededRun[] = []
  const present = presentRuns(facility, samples, now)
  for (const cryostat of facility.cryostats) {
    const next = present.filter(spec => spec.cryostat === cryostat.slug).map(spec => spec.startsAt.getTime())
    const until = new Date(Math.min(now.getTime(), ...next) - 36 * 3_600_000)
    past.push(...await seedRuns(db, pastRuns(cryostat, samples, random, until).map(spec => ({ ...spec, state: 'finished' as const })), facts, random))
  }
  for (const cryostat of facility.cryostats) {
    const learned = await readFinishedRuns(db, cryostat)
    running.push(...await seedRuns(db, present.filter(spec => spec.cryostat === cryostat.slug), facts, random, learned))
  }
  const books = new HeliumBooks(facility)
  books.bookEntries([...past, ...running].flatMap(({ entries, cryostat }) => entries.map(entry => ({ entry, cryostat }))))
  books.stockUp(210, new Date(now.getTime() - 26 * 3_600_000))
  await books.write(db, orderedHelium(now))
  await seedClosures(db, facility, people.managerId, now)
  await seedDeposits(db, [...past, ...running])
  await seedInvoices(db, past, { files, fonts }, now)
  await seedResults(db, past, { files, random, now })
  return { signIns: people.signIns, runCount: past.length + running.length }
}
