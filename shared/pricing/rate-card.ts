import { DomainError } from '#shared/errors'

/** Classes of groups; the class decides the rate and whether a deposit is due. */
export const GROUP_CLASSES = ['internal', 'academic', 'industry'] as const

/** One class of groups. */
export type GroupClass = (typeof GROUP_CLASSES)[number]

/** Prices of one class, minor units of the card's currency. */
export interface ClassPrices {
  readonly perCooldownMinor: number
  readonly perDayMinor: number
  readonly perLitreMinor: number
  readonly recoveryCreditPerLitreMinor: number
  readonly perOperatorHourMinor: number
  readonly perMountingMinor: number
  readonly minimumMinor: number
  /** VAT in basis points, 2500 for 25 %. */
  readonly vatBasisPoints: number
}

/** A rate card as pricing needs it. */
export interface RateCard {
  readonly id: string
  /** First day of validity, `YYYY-MM-DD` in facility time. */
  readonly validFrom: string
  readonly currency: string
  readonly depositPercent: number
}

/**
 * The card in force on a day: the one with the latest first day of validity that has come.
 *
 * @param cards issued cards, any order
 * @param day `YYYY-MM-DD`
 * @throws DomainError when none is in force yet
 */
export function cardInForce<Card extends Pick<RateCard, 'validFrom'>>(cards: readonly Card[], day: string): Card {
  const valid = cards.filter(card => card.validFrom <= day).sort((a, b) => b.validFrom.localeCompare(a.validFrom))[0]
  if (!valid) throw new DomainError('conflict', `No rate card is in force on ${day}. Ask the facility's manager to issue one.`)
  return valid
}

/** Whether a group of this class pays a deposit; internal groups give a cost code instead. */
export function paysDeposit(groupClass: GroupClass): boolean {
  return groupClass !== 'internal'
}
