import { describe, expect, it } from 'vitest'
import { cardInForce, GROUP_CLASSES, paysDeposit } from '#shared/pricing/rate-card'

describe('the rate card in force', () => {
  const cards = [{ validFrom: '2027-01-01' }, { validFrom: '2028-01-01' }, { validFrom: '2026-07-01' }]
  it.each([
    ['2026-07-01', '2026-07-01'], ['2026-12-31', '2026-07-01'], ['2027-01-01', '2027-01-01'], ['2027-12-31', '2027-01-01'], ['2030-05-05', '2028-01-01'],
  ])('on %s is that of %s', (day, validFrom) => {
    expect(cardInForce(cards, day)).toEqual({ validFrom })
  })

  it('leaves the list as it was', () => {
    cardInForce(cards, '2030-01-01')
    expect(cards.map(card => card.validFrom)).toEqual(['2027-01-01', '2028-01-01', '2026-07-01'])
  })

  it('is asked of the manager where none has come yet', () => {
    const sentence = 'No rate card is in force on 2026-06-30. Ask the facility\'s manager to issue one.'
    expect(() => cardInForce(cards, '2026-06-30')).toThrow(expect.objectContaining({ code: 'conflict', message: sentence }))
    expect(() => cardInForce([], '2026-06-30')).toThrow(sentence)
  })
})

describe('a deposit', () => {
  it('is paid by academic and industry groups, not by internal ones', () => {
    // product.md: internal groups give a cost code, the other two pay.
    expect(GROUP_CLASSES.map(groupClass => [groupClass, paysDeposit(groupClass)])).toEqual([['internal', false], ['academic', true], ['industry', true]])
  })
})
