import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { HeliumAccount } from '#shared/helium/entries'
import { checkBalanced, heliumBalances } from '#shared/helium/entries'
import { forecastStock } from '#shared/helium/forecast'
import { boilOffEntry, correctionEntry, deliveryEntry, stockTakeEntry, transferEntry } from '#shared/helium/movements'
import { runHeliumUse } from '#shared/helium/run-use'
import { vapourPressurePa, vapourPressureTemperatureK } from '#shared/helium/vapour-pressure'
import { levelFromLitres, litresFromLevel } from '#shared/helium/vessel'
import { cooldownLitres } from '#shared/planning/cooldown'
import { MS_PER_HOUR as H } from '#shared/units/helium-units'

const account = (kind: HeliumAccount['kind']): HeliumAccount => ({ accountId: kind, kind, name: kind })
const [supplier, dewar, cryostat, recovery, lost] = (['supplier', 'dewar', 'cryostat', 'recovery', 'lost'] as const).map(account) as
  [HeliumAccount, HeliumAccount, HeliumAccount, HeliumAccount, HeliumAccount]
const mass = fc.integer({ min: 1, max: 500_000_000 })
const share = fc.double({ min: 0, max: 1, noNaN: true })

const movement = fc.oneof(
  mass.map(amountMg => deliveryEntry({ supplier, dewar, amountMg })),
  fc.tuple(mass, share, share).map(([takenMg, arrived, caught]) => {
    const arrivedMg = Math.floor(takenMg * arrived)
    return transferEntry({ from: dewar, to: cryostat, takenMg, arrivedMg, recoveredMg: Math.floor((takenMg - arrivedMg) * caught), recovery, lost })
  }),
  fc.tuple(mass, share).map(([gasMg, caught]) => boilOffEntry({ vessel: cryostat, gasMg, recoveredMg: Math.floor(gasMg * caught), recovery, lost })),
  fc.tuple(mass, mass).filter(([a, b]) => a !== b).map(([bookMg, countedMg]) =>
    stockTakeEntry({ account: dewar, lost, bookMg, countedMg, reason: 'count' })!),
)

describe('helium books', () => {
  it('sum to zero whatever is posted, and a correction takes an entry back', () => {
    fc.assert(fc.property(fc.array(movement, { maxLength: 40 }), (entries) => {
      for (const entry of entries) checkBalanced(entry.postings)
      const balances = heliumBalances(entries)
      expect([...balances.values()].reduce((sum, value) => sum + value, 0)).toBe(0)
      const undone = heliumBalances(entries.map(entry => correctionEntry(entry, 'undo')), balances)
      expect([...undone.values()].every(value => value === 0)).toBe(true)
    }))
  })

  it('hold inside the facility what was delivered, less what was lost', () => {
    fc.assert(fc.property(fc.array(movement, { maxLength: 40 }), (entries) => {
      const balances = heliumBalances(entries)
      const at = (id: string): number => balances.get(id) ?? 0
      expect(at('dewar') + at('cryostat') + at('recovery')).toBe(0 - at('supplier') - at('lost'))
    }))
  })
})

describe('helium use of a run', () => {
  it('always splits exactly, and no part but a flagged remainder is below zero', () => {
    const transfer = fc.tuple(fc.integer({ min: 0, max: 100 }), mass, mass, mass, fc.boolean())
      .map(([hour, takenMg, beforeMg, afterMg, cooling]) => ({ startMs: hour * H, endMs: (hour + 1) * H, takenMg, beforeMg, afterMg, cooling }))
    fc.assert(fc.property(fc.array(transfer, { maxLength: 6 }), mass, mass, mass, share, (transfers, startMg, endMg, returnedMg, loss) => {
      const use = runHeliumUse({ transfers, startMg, endMg, endMs: 150 * H, returnedMg }, { staticBoilOffLitresPerHour: 0.4, transferLossShare: loss * 0.9 })
      expect(use.cooldownMg + use.staticBoilOffMg + use.measurementMg).toBe(use.usedMg)
      expect(use.usedMg + use.transferLossMg + endMg - startMg).toBe(use.takenMg)
      expect(Math.min(use.cooldownMg, use.staticBoilOffMg, use.transferLossMg)).toBeGreaterThanOrEqual(0)
      if (use.measurementMg < 0) expect(use.remarks.length).toBeGreaterThan(0)
    }))
  })
})

describe('helium forecast', () => {
  const NOW = 1_700_000_000_000
  const day = fc.integer({ min: -5, max: 40 })
  const draw = fc.tuple(day, fc.integer({ min: 0, max: 10 }), fc.integer({ min: 0, max: 200 }), fc.integer({ min: 0, max: 20 }))
    .map(([start, length, litres, sdLitres]) => ({ startMs: NOW + start * 24 * H, endMs: NOW + (start + length) * 24 * H, litres, sdLitres }))
  const run = fc.tuple(fc.boolean(), fc.array(draw, { maxLength: 4 })).map(([held, draws]) => ({ runId: 'r', held, draws }))
  const delivery = fc.tuple(day, fc.integer({ min: 0, max: 250 })).map(([at, litres]) => ({ atMs: NOW + at * 24 * H, litres }))

  it('conserves helium: the end is the stock, plus deliveries, less what runs still draw', () => {
    fc.assert(fc.property(fc.array(run, { maxLength: 8 }), fc.array(delivery, { maxLength: 4 }), fc.constantFrom('held', 'all-asked'), (runs, deliveries, mode) => {
      const forecast = forecastStock({
        nowMs: NOW, untilMs: NOW + 60 * 24 * H, stockLitres: 300, stockSdLitres: 5, reserveLitres: 60, dewarBoilOffLitresPerHour: 0.05, runs, deliveries, mode,
      })
      const counted = runs.filter(({ held }) => held || mode === 'all-asked').flatMap(({ draws }) => draws)
      const toCome = counted.reduce((sum, { startMs, endMs, litres }) => {
        if (startMs >= NOW) return sum + litres
        return endMs > NOW ? sum + litres * (endMs - NOW) / (endMs - startMs) : sum
      }, 0)
      const arriving = deliveries.filter(({ atMs }) => atMs >= NOW).reduce((sum, { litres }) => sum + litres, 0)
      const end = forecast.points.at(-1)
      expect(end?.likelyLitres).toBeCloseTo(300 + arriving - toCome - 0.05 * 60 * 24, 6)

      for (const point of forecast.points) {
        expect(point.lowLitres).toBeLessThanOrEqual(point.likelyLitres)
        expect(point.highLitres).toBeGreaterThanOrEqual(point.likelyLitres)
        if (forecast.likelyShortMs === undefined) expect(point.likelyLitres).toBeGreaterThanOrEqual(60)
        else if (point.atMs < forecast.likelyShortMs) expect(point.likelyLitres).toBeGreaterThanOrEqual(60)
      }
      if (forecast.likelyShortMs !== undefined) expect(forecast.lowShortMs).toBeLessThanOrEqual(forecast.likelyShortMs)
    }))
  })
})

describe('scales turn back', () => {
  it('level to litres and back', () => {
    const table = fc.array(fc.tuple(fc.integer({ min: 1, max: 99 }), fc.integer({ min: 1, max: 40 })), { maxLength: 12 }).map((rows) => {
      const percents = [0, ...[...new Set(rows.map(([percent]) => percent))].sort((a, b) => a - b), 100]
      let litres = 0
      return percents.map((percent, i) => ({ percent, litres: litres += (i === 0 ? 0 : rows[i - 1]?.[1] ?? 3) }))
    })
    fc.assert(fc.property(table, fc.double({ min: 0, max: 100, noNaN: true }), (calibration, percent) => {
      expect(levelFromLitres(calibration, litresFromLevel(calibration, percent))).toBeCloseTo(percent, 8)
    }))
  })

  it('temperature to vapour pressure and back', () => {
    fc.assert(fc.property(fc.double({ min: 1.25, max: 5, noNaN: true }), (temperatureK) => {
      expect(Math.abs(vapourPressureTemperatureK(vapourPressurePa(temperatureK)) - temperatureK)).toBeLessThan(2e-6)
    }))
    fc.assert(fc.property(fc.double({ min: 0.65, max: 3.2, noNaN: true }), (temperatureK) => {
      expect(vapourPressureTemperatureK(vapourPressurePa(temperatureK, 'helium-3'), 'helium-3')).toBeCloseTo(temperatureK, 10)
    }))
  })

  it('more mass, a warmer start or a smaller share never needs less helium', () => {
    const one = (massKg: number): { material: 'copper', massKg: number }[] => [{ material: 'copper', massKg }]
    fc.assert(fc.property(fc.double({ min: 0.1, max: 50, noNaN: true }), fc.double({ min: 10, max: 290, noNaN: true }), fc.double({ min: 0, max: 0.9, noNaN: true }), (massKg, startK, used) => {
      const litres = cooldownLitres(one(massKg), startK, used)
      expect(cooldownLitres(one(massKg * 1.1), startK, used)).toBeGreaterThan(litres)
      expect(cooldownLitres(one(massKg), startK + 5, used)).toBeGreaterThan(litres)
      expect(cooldownLitres(one(massKg), startK, used + 0.05)).toBeLessThan(litres)
    }), { numRuns: 50 })
  })
})
