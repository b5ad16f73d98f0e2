import { describe, expect, it } from 'vitest'
import { runHeliumUse } from '#shared/helium/run-use'
import { heliumMgFromLitres as mg, MS_PER_HOUR as H } from '#shared/units/helium-units'

const FACTS = { staticBoilOffLitresPerHour: 0.5, transferLossShare: 0.1 }

/** Cooldown fill of 60 L leaving 20 L, then 24 h, a refill of 12 L raising 6 L to 16 L, then 10 h more. */
const LOG = {
  transfers: [
    { startMs: 0, endMs: 4 * H, takenMg: mg(60), beforeMg: 0, afterMg: mg(20), cooling: true },
    { startMs: 28 * H, endMs: 29 * H, takenMg: mg(12), beforeMg: mg(6), afterMg: mg(16), cooling: false },
  ],
  startMg: 0, endMg: mg(9), endMs: 39 * H, returnedMg: mg(50),
}

describe('helium use of a run', () => {
  it('splits what was transferred less what is left', () => {
    const use = runHeliumUse(LOG, FACTS)
    // By hand, litres: taken 60 + 12 = 72. Line: 10 % of 60 = 6 while cooling, 12 − (16 − 6) = 2 in the refill: 8.
    // Transferred 64, left 9, used 55. Cooldown 60 − 20 − 6 = 34. Boiled 55 − 34 = 21 = (20 − 6) + (16 − 9).
    // Static 0.5 L/h × (24 + 10) h = 17; measurement 4. Not returned 55 + 8 − 50 = 13.
    const litres = { takenMg: 72, transferLossMg: 8, transferredMg: 64, leftMg: 9, usedMg: 55, cooldownMg: 34, staticBoilOffMg: 17, measurementMg: 4, returnedMg: 50, notReturnedMg: 13 }
    for (const [key, expected] of Object.entries(litres)) {
      expect(Math.abs(use[key as keyof typeof litres] - mg(expected)), key).toBeLessThanOrEqual(3)
    }
    expect(use.usedMg).toBe(use.cooldownMg + use.staticBoilOffMg + use.measurementMg)
    expect(use.remarks).toEqual([])
  })

  it('counts a bath that was already cold, with no cooldown', () => {
    const use = runHeliumUse({ transfers: [], startMg: mg(30), endMg: mg(18), endMs: 10 * H, returnedMg: 0 }, FACTS)
    expect(use).toMatchObject({ takenMg: 0, usedMg: mg(30) - mg(18), cooldownMg: 0, leftMg: mg(18) - mg(30) })
    expect(use.staticBoilOffMg + use.measurementMg).toBe(use.usedMg)
  })

  it('never gives static boil-off more than boiled off', () => {
    const use = runHeliumUse(LOG, { ...FACTS, staticBoilOffLitresPerHour: 5 })
    expect(use.measurementMg).toBe(0)
    expect(use.staticBoilOffMg).toBe(use.usedMg - use.cooldownMg)
  })

  it('says what does not fit', () => {
    const grown = { startMs: 0, endMs: H, takenMg: mg(5), beforeMg: 0, afterMg: mg(6), cooling: false }
    const use = runHeliumUse({ transfers: [grown], startMg: 0, endMg: mg(6), endMs: H, returnedMg: mg(3) }, FACTS)
    expect(use.remarks).toHaveLength(3)
    expect(use.remarks[0]).toMatch(/gained more than the dewar gave/)
    expect(use.usedMg).toBe(use.cooldownMg + use.staticBoilOffMg + use.measurementMg)
  })

  it('is nothing for an empty log', () => {
    expect(runHeliumUse({ transfers: [], startMg: 0, endMg: 0, endMs: 0, returnedMg: 0 }, FACTS)).toMatchObject({ usedMg: 0, notReturnedMg: 0, remarks: [] })
  })

  it('refuses amounts that are no mass', () => {
    expect(() => runHeliumUse({ ...LOG, endMg: -1 }, FACTS)).toThrow(/Correct that entry/)
    expect(() => runHeliumUse({ ...LOG, returnedMg: 0.5 }, FACTS)).toThrow(/whole number/)
    expect(() => runHeliumUse(LOG, { ...FACTS, transferLossShare: 1 })).toThrow(/share/)
  })
})
