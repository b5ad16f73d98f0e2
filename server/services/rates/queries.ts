import { asc, desc, isNotNull } from 'drizzle-orm'
import { cardInForce } from '#shared/pricing/rate-card'
import { wallTimeOf } from '#shared/time/facility-time'
import type { RateCardSheet } from '#shared/types/facility'
import type { Database } from '#server/db/client'
import { rateCardPrices, rateCards } from '#server/db/schema'
import { readFacility } from '#server/services/facility/queries'

/** Issued rate cards, newest first, with the one in force marked. */
export async function listRateCards(db: Database, now: Date): Promise<RateCardSheet[]> {
  const facility = await readFacility(db)
  const cards = await db.select().from(rateCards).where(isNotNull(rateCards.issuedAt)).orderBy(desc(rateCards.validFrom))
  const prices = await db.select().from(rateCardPrices).orderBy(asc(rateCardPrices.groupClass))
  const inForce = cards.length > 0 ? cardInForce(cards, wallTimeOf(now, facility.timeZone).date).id : null
  return cards.map(({ id, name, validFrom, currency, depositPercent }) => ({
    id, name, validFrom, currency, depositPercent, isInForce: id === inForce,
    prices: prices.filter(price => price.rateCardId === id).map(({ rateCardId: _, ...price }) => price),
  }))
}
