import { describe, expect, it } from 'vitest'
import { analyseHeatCapacity } from '#shared/heat-capacity/analyse'
import type { AnalysisInput } from '#shared/heat-capacity/analyse'
import { CHECKS } from '#shared/heat-capacity/checks/index'
import { CHECK_THRESHOLDS, thresholdsWith } from '#shared/heat-capacity/checks/thresholds'
import type { CheckId } from '#shared/heat-capacity/types'
import { verdictOf } from '#shared/heat-capacity/verdict'
import type { Law } from '../../../support/heat-capacity-files'
import { copperLaw, normals, silverLaw } from '../../../support/heat-capacity-files'

const SILVER = { formula: 'Ag', molarMassGPerMol: 107.868, atomsPerFormulaUnit: 1, kind: 'metal' as const }

function curveOf(law: Law, { from = 1.2, to = 4.4, points = 40, noise = 0.005, seed = 7 } = {}) {
  const normal = normals(seed)
  const temperatureK = Array.from({ length: points }, (_, index) => from * (to / from) ** (index / (points - 1)))
  return { temperatureK, heatCapacity: temperatureK.map(t => law(t) * (1 + noise * normal())), sigma: temperatureK.map(t => law(t) * noise), rowNumbers: temperatureK.map((_, index) => index + 2) }
}

const analyse = (more: Partial<AnalysisInput> = {}) => analyseHeatCapacity({ curve: curveOf(silverLaw), sample: SILVER, model: { terms: ['gamma', 'beta3'], windowK: [1, 4.5] }, ...more })
const check = (id: CheckId, more: Partial<AnalysisInput> = {}) => analyse(more).checks.find(each => each.id === id)!

describe('every check', () => {
  it('is there once, in order, with a title, a sentence, a source and two lines of why', () => {
    const { checks } = analyse()
    expect(checks.map(each => each.id)).toEqual(Object.keys(CHECKS))
    for (const each of checks) {
      expect(each.title).toMatch(/^[A-ZΘγ]/)
      expect(each.message).toMatch(/\.$/)
      expect(each.source.length).toBeGreaterThan(10)
      expect(each.why.split('\n')).toHaveLength(2)
      if (each.status !== 'not-applicable') {
        expect(each.value, each.id).toBeTypeOf('number')
        expect(each.band, each.id).toHaveLength(2)
      }
    }
  })

  it('has no NaN in a sentence, whatever the curve', () => {
    for (const law of [(t: number) => 1e-9 * t, (t: number) => 1e9 * t ** 3, (t: number) => 5 / t ** 2, () => 3, (t: number) => t ** 2]) {
      for (const kind of ['metal', 'insulator', 'unknown', 'superconductor'] as const) {
        const { checks } = analyse({ curve: curveOf(law), sample: { ...SILVER, kind } })
        for (const each of checks) expect(each.message, each.id).not.toMatch(/NaN|undefined|Infinity/)
      }
    }
  })

  it('stays the same when the rows come in another order, and scales with the mass', () => {
    const plain = analyse()
    const twice = curveOf(silverLaw)
    const scaled = analyse({ curve: { ...twice, heatCapacity: twice.heatCapacity.map(value => 2 * value), sigma: twice.sigma.map(value => 2 * value) } })
    expect(scaled.fit.coefficients.gamma!.value / plain.fit.coefficients.gamma!.value).toBeCloseTo(2, 10)
  })
})

describe('thresholds', () => {
  it('each name their source and lie in their own range', () => {
    for (const [id, row] of Object.entries(CHECK_THRESHOLDS)) {
      expect(row.source.length, id).toBeGreaterThan(10)
      expect(row.value >= row.range[0] && row.value <= row.range[1], id).toBe(true)
    }
  })

  it('can be tuned within their range; anything else is passed over', () => {
    expect(thresholdsWith({ coveragePoints: 50, debyeLowK: -3, nonsense: 1 })).toMatchObject({ coveragePoints: 50, debyeLowK: 30 })
    expect(check('coverage').status).toBe('ok')
    expect(check('coverage', { thresholds: { coveragePoints: 50 } })).toMatchObject({ status: 'caution', band: [50, null] })
  })
})

describe('mass', () => {
  const withMass = (more: object) => check('mass', { sample: { ...SILVER, ...more } })
  it.each([
    ['nothing to compare', {}, 'not-applicable'],
    ['a mass known well', { massMg: 500, massUncertaintyMg: 1 }, 'ok'],
    ['a mass known badly', { massMg: 500, massUncertaintyMg: 25 }, 'caution'],
    // 10.5 g/cm³ × 50 mm³ = 525 mg.
    ['dimensions that agree', { massMg: 520, volumeMm3: 50 }, 'ok'],
    ['dimensions a little off', { massMg: 460, volumeMm3: 50 }, 'caution'],
    ['dimensions that contradict', { massMg: 300, volumeMm3: 50 }, 'fail'],
    ['a density that is not silver’s', { massMg: 300, densityGPerCm3: 2.7 }, 'fail'],
  ])('%s', (_, more, status) => expect(withMass(more).status).toBe(status))

  it('is carried into γ as a common error', () => {
    const plain = analyse().fit.coefficients.gamma!
    const { value, standardError } = analyse({ sample: { ...SILVER, massMg: 100, massUncertaintyMg: 2 } }).fit.coefficients.gamma!
    expect(value).toBe(plain.value)
    expect(standardError).toBeCloseTo(Math.hypot(plain.standardError, 0.02 * value), 10)
  })
})

describe('standard', () => {
  const reading = { meanDeviationPercent: 0.5, ageDays: 20 }
  it.each([
    ['none', undefined, 'not-applicable'],
    ['a fresh one', reading, 'ok'],
    ['an old one', { ...reading, ageDays: 400 }, 'caution'],
    ['one that is off', { ...reading, meanDeviationPercent: -4 }, 'caution'],
    ['one outside the limits of its cryostat', { ...reading, limits: [-0.3, 0.3] as const }, 'caution'],
    ['one inside them', { ...reading, limits: [-1, 1] as const }, 'ok'],
  ])('%s', (_, standard, status) => expect(check('standard', { standard }).status).toBe(status))
})

describe('repeat', () => {
  const sweeps = (factor: number) => {
    const up = curveOf(silverLaw, { points: 30, noise: 0.001 })
    const down = curveOf(silverLaw, { points: 30, noise: 0.001, seed: 11 })
    const rows = [...up.temperatureK.map((t, index) => [t, up.heatCapacity[index]!, index + 2] as const), ...down.temperatureK.map((t, index) => [t * 1.0005, down.heatCapacity[index]! * factor, 61 - index] as const)].sort((a, b) => a[0] - b[0])
    return { temperatureK: rows.map(row => row[0]), heatCapacity: rows.map(row => row[1]), rowNumbers: rows.map(row => row[2]) }
  }
  it.each([[1, 'ok'], [1.05, 'caution'], [1.15, 'fail']] as const)('up and down sweeps that differ by %d', (factor, status) => {
    expect(check('repeat', { curve: sweeps(factor) }).status).toBe(status)
  })

  it('does not take a dense sweep for repeats', () => {
    expect(check('repeat', { curve: curveOf(silverLaw, { points: 4000 }) }).status).toBe('not-applicable')
  })
})

describe('transition and upturn on sound curves', () => {
  it.each([[20, 1], [60, 2], [500, 3], [10_000, 4]])('%d points raise no false alarm', (points, seed) => {
    const { checks, verdict } = analyse({ curve: curveOf(silverLaw, { points, seed, noise: 0.01 }) })
    expect(checks.find(each => each.id === 'transition')!.status).toBe('ok')
    expect(checks.find(each => each.id === 'upturn')!.status).toBe('ok')
    expect(verdict).not.toBe('fail')
  })

  it('false alarms stay rare over 300 noisy files', () => {
    const failed = Array.from({ length: 300 }, (_, seed) => analyse({ curve: curveOf(silverLaw, { seed: seed + 100, noise: 0.02 }) })).filter(each => each.verdict === 'fail')
    expect(failed.length).toBeLessThanOrEqual(9)
  })
})

describe('many points', () => {
  it('make a term that hardly matters a caution, not a failure', () => {
    const many = { from: 1.2, to: 6.7, points: 20_000, noise: 0.003 }
    const copper = { formula: 'Cu', molarMassGPerMol: 63.546, atomsPerFormulaUnit: 1, kind: 'metal' as const }
    const { checks, verdict } = analyse({ curve: curveOf(copperLaw, many), sample: copper, model: { terms: ['gamma', 'beta3'], windowK: [1, 7] } })
    const constant = checks.find(each => each.id === 'zero-at-zero')!
    expect(Math.abs(constant.value!)).toBeGreaterThan(5)
    expect(constant.status).toBe('caution')
    expect(verdict).toBe('caution')
    const offset = analyse({ curve: curveOf(t => copperLaw(t) + 0.05, many), sample: copper, model: { terms: ['gamma', 'beta3'], windowK: [1, 7] } })
    expect(offset.checks.find(each => each.id === 'zero-at-zero')!.status).toBe('fail')
  })
})

describe('verdict', () => {
  it('is the worst check', () => {
    expect(verdictOf([{ status: 'ok' }, { status: 'not-applicable' }])).toBe('ok')
    expect(verdictOf([{ status: 'caution' }, { status: 'ok' }])).toBe('caution')
    expect(verdictOf([{ status: 'caution' }, { status: 'fail' }, { status: 'ok' }])).toBe('fail')
    expect(verdictOf([])).toBe('ok')
  })
})
