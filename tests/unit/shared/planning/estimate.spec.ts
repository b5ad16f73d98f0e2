import { describe, expect, it } from 'vitest'
import { EIGHTY_PERCENT_Z } from '#shared/helium/eighty-percent'
import { cooldownLitres } from '#shared/planning/cooldown'
import { estimateRun } from '#shared/planning/estimate'
import { forecastRun } from '#shared/planning/forecast-run'
import type { HeliumPart } from '#shared/planning/types'
import { COPPER, finished, PETREL, PUFFIN, request } from './builders'

const PARTS: readonly HeliumPart[] = ['cooldown', 'fill', 'transferLoss', 'staticBoilOff', 'measurement']
const likely = (estimate: ReturnType<typeof estimateRun>): number => PARTS.reduce((sum, part) => sum + estimate.heliumLitres[part].likely, 0)
const drawn = (estimate: ReturnType<typeof estimateRun>): number => estimate.phases.reduce((sum, phase) => sum + phase.drawnLitres, 0)

describe('estimate of a run', () => {
  it('has the phases in order, with nitrogen only where asked', () => {
    expect(estimateRun(request(), []).phases.map(({ phase }) => phase)).toEqual(['prepare', 'cool-to-77', 'cool-to-base', 'measure', 'warm-up', 'turn-round'])
    expect(estimateRun(request({ nitrogenPrecool: false }), []).phases.map(({ phase }) => phase)).not.toContain('cool-to-77')
  })

  it('adds up: parts to the total, draws to the total, phases to the hours', () => {
    for (const points of [1, 60, 4000]) {
      const estimate = estimateRun(request({ points }), [])
      expect(likely(estimate)).toBeCloseTo(estimate.totalHeliumLitres.likely, 9)
      expect(drawn(estimate)).toBeCloseTo(estimate.totalHeliumLitres.likely, 9)
      expect(estimate.phases.reduce((sum, phase) => sum + phase.hours.likely, 0)).toBeCloseTo(estimate.totalHours.likely, 9)
    }
  })

  it('follows the physics of the cooldown and the loss of the line', () => {
    const estimate = estimateRun(request(), [])
    expect(estimate.heliumLitres.cooldown.likely).toBeCloseTo(cooldownLitres(PETREL.coldMass, 77, 0.4), 9)
    // Short measurement: cooldown and one fill of 30 L leave the dewar through a line that loses 12 %.
    const { cooldown, transferLoss } = estimate.heliumLitres
    expect(transferLoss.likely).toBeCloseTo((cooldown.likely + 30) * 0.12 / 0.88, 9)
    const warm = estimateRun(request({ nitrogenPrecool: false }), [])
    expect(warm.heliumLitres.cooldown.likely).toBeGreaterThan(3 * cooldown.likely)
  })

  it('refills when the measurement outlasts the bath, and says so', () => {
    const estimate = estimateRun(request({ points: 4000 }), [])
    const hours = estimate.phases.find(({ phase }) => phase === 'measure')?.hours.likely as number
    expect(estimate.heliumLitres.staticBoilOff.likely).toBeCloseTo(0.3 * hours, 9)
    // The lowest level kept is 20 % of 30 L.
    expect(estimate.heliumLitres.fill.likely).toBeCloseTo(6, 9)
    expect(estimate.basis.join(' ')).toMatch(/is refilled \d+ times while measuring/)
  })

  it('counts magnet sweeps as measurement', () => {
    const extra = estimateRun(request({ sweeps: 4 }), []).heliumLitres.measurement.likely - estimateRun(request(), []).heliumLitres.measurement.likely
    expect(extra).toBeCloseTo(4 * 0.5, 9)
  })

  it('carries 80 % intervals', () => {
    const { totalHeliumLitres: helium, totalHeliumSdLitres: sd, totalHours } = estimateRun(request(), [])
    expect(helium.high - helium.likely).toBeCloseTo(EIGHTY_PERCENT_Z * sd, 9)
    expect(helium.low).toBeLessThan(helium.likely)
    expect(totalHours.low).toBeLessThan(totalHours.likely)
  })

  it('narrows with runs that agree and says what it rests on', () => {
    const used = cooldownLitres(PETREL.coldMass, 77, 0.55)
    const history = Array.from({ length: 14 }, (_, i) => finished(`r${i}`, {
      cooldownLitres: used * (1 + 0.01 * (i % 3 - 1)), staticBoilOffLitresPerHour: 0.3 + 0.005 * (i % 3 - 1),
      phaseHours: { 'prepare': 4, 'cool-to-77': 12, 'cool-to-base': 6, 'warm-up': 18, 'turn-round': 3 },
    }))
    const [before, after] = [estimateRun(request(), []), estimateRun(request(), history)]
    expect(after.totalHeliumSdLitres).toBeLessThan(before.totalHeliumSdLitres)
    expect(after.totalHours.high - after.totalHours.low).toBeLessThan(before.totalHours.high - before.totalHours.low)
    expect(after.finishedRunCount).toBe(14)
    expect(after.basis[0]).toBe('Rests on 14 finished runs of Petrel and on the stated starting values, which count for two runs.')
    expect(before.basis[0]).toMatch(/no finished run yet/)
    expect(after.basis.join(' ')).toMatch(/53.±.\d+.% of the enthalpy of the gas \(learned from 14 finished runs\)/)
  })

  it('uses no liquid in a closed cycle', () => {
    const estimate = estimateRun(request({ cryostat: PUFFIN, temperatureRangeK: [3, 300] }), [])
    expect(estimate.totalHeliumLitres).toEqual({ low: 0, likely: 0, high: 0 })
    expect(estimate.phases.map(({ phase }) => phase)).not.toContain('cool-to-77')
    expect(estimate.basis.join(' ')).toContain('uses no liquid helium')
    expect(forecastRun({ runId: 'p', held: true, startMs: 0, estimate }).draws).toEqual([])
  })

  it('refuses what the cryostat cannot do, naming the field and the remedy', () => {
    expect(() => estimateRun(request({ temperatureRangeK: [0.3, 10] }), [])).toThrow('Petrel reaches 1.5 K. Enter a lowest temperature of 1.5 K or more, or choose a colder cryostat.')
    expect(() => estimateRun(request({ temperatureRangeK: [2, 400] }), [])).toThrow(/300 K or less/)
    expect(() => estimateRun(request({ sweeps: -1 }), [])).toThrow(/sweeps/)
    expect(() => estimateRun(request({ points: 0 }), [])).toThrow(/points/)
    expect(() => estimateRun(request({ sample: { ...COPPER, amountMol: Number.NaN } }), [])).toThrow(/amount of sample/)
  })

  it('hands its draws to the forecast over real time', () => {
    const estimate = estimateRun(request({ points: 4000 }), [])
    const run = forecastRun({ runId: 'r', held: true, startMs: 1000, estimate })
    expect(run.draws).toHaveLength(2)
    expect(run.draws.reduce((sum, draw) => sum + draw.litres, 0)).toBeCloseTo(estimate.totalHeliumLitres.likely, 9)
    expect(run.draws[0]?.startMs).toBeGreaterThan(1000)
    expect(run.draws[1]?.startMs).toBe(run.draws[0]?.endMs)
  })
})
