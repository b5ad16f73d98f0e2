import type { Database } from '#server/db/client'
import { rateCardPrices, rateCards } from '#server/db/schema'
import { eq } from 'drizzle-orm'

const PRICES = [
  { groupClass: 'internal' as const, perCooldownMinor: 18_000, perDayMinor: 9_000, perLitreMinor: 900, recoveryCreditPerLitreMinor: 450, perOperatorHourMinor: 4_000, perMountingMinor: 3_000, minimumMinor: 15_000, vatBasisPoints: 0 },
  { groupClass: 'academic' as const, perCooldownMinor: 32_000, perDayMinor: 16_000, perLitreMinor: 1_150, recoveryCreditPerLitreMinor: 450, perOperatorHourMinor: 6_500, perMountingMinor: 5_000, minimumMinor: 25_000, vatBasisPoints: 2500 },
  { groupClass: 'industry' as const, perCooldownMinor: 78_000, perDayMinor: 42_000, perLitreMinor: 1_900, recoveryCreditPerLitreMinor: 450, perOperatorHourMinor: 12_000, perMountingMinor: 9_000, minimumMinor: 60_000, vatBasisPoints: 2500 },
]

/** A rate card of the seed. */
export type SeededCard = typeof rateCards.$inferSelect

/** Two issued cards: prices went up a little at the start of this year. */
export async function seedRateCards(db: Database, currency: string, thisYear: number): Promise<SeededCard[]> {
  const cards: SeededCard[] = []
  for (const [year, factor] of [[thisYear - 3, 0.94], [thisYear, 1]] as const) {
    const [card] = await db.insert(rateCards).values({ name: `Rates ${year}`, validFrom: `${year}-01-01`, currency, depositPercent: 30 }).returning()
    await db.insert(rateCardPrices).values(PRICES.map(({ groupClass, vatBasisPoints, ...prices }) => ({
      rateCardId: card!.id, groupClass, vatBasisPoints, ...Object.fromEntries(Object.entries(prices).map(([key, value]) => [key, Math.round(value * factor / 50) * 50])) as typeof prices,
    })))
    await db.update(rateCards).set({ issuedAt: new Date(`${year - 1}-12-10T09:00:00Z`) }).where(eq(rateCards.id, card!.id))
    cards.push(card!)
  }
  return cards
}
