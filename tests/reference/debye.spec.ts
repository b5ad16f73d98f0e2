import { describe, expect, it } from 'vitest'
import type { DebyeOrder } from '#shared/heat-capacity/debye'
import { debyeEnergy, debyeEntropy, debyeFunction, debyeHeatCapacity, debyeTemperatureFromBeta3, einsteinHeatCapacity, schottkyHeatCapacity } from '#shared/heat-capacity/debye'
import { GAS_CONSTANT_J_PER_MOL_K } from '#shared/materials/constants'
import { referenceTable, relativeDifference } from '../support/reference-data'

// Sources of the tables: tests/reference/data/heat-capacity/SOURCE.md. They print 15 digits.
const TOLERANCE = 1e-10

describe('Debye functions', () => {
  const rows = referenceTable('heat-capacity/b_debye_functions.csv')
  it.each(([1, 2, 3, 4] as DebyeOrder[]))('D%d agrees with GSL and mpmath', (order) => {
    expect(rows.length).toBeGreaterThan(20)
    for (const row of rows) {
      expect(relativeDifference(debyeFunction(order, Number(row.x)), Number(row[`D${order}`])), `x = ${row.x}`).toBeLessThan(5e-14)
      expect(relativeDifference(debyeFunction(order, Number(row.x)), Number(row[`GSL D${order}`])), `x = ${row.x}`).toBeLessThan(5e-14)
    }
  })
  it('joins its two forms at x = 2 without a step', () => {
    for (const order of [1, 2, 3, 4] as DebyeOrder[]) {
      const below = debyeFunction(order, 2 - 1e-12)
      expect(relativeDifference(below, debyeFunction(order, 2))).toBeLessThan(2e-12)
    }
  })
  it('ends in 1 and in 0, and refuses what is no argument', () => {
    expect(debyeFunction(3, 0)).toBe(1)
    expect(debyeFunction(3, Infinity)).toBe(0)
    expect(() => debyeFunction(3, -1)).toThrow('zero or more')
    expect(() => debyeFunction(3, Number.NaN)).toThrow('zero or more')
  })
})

describe('Debye lattice', () => {
  const rows = referenceTable('heat-capacity/b_debye_heat_capacity.csv')
  it('has heat capacity, heat and entropy of the table', () => {
    expect(rows.length).toBeGreaterThan(30)
    for (const row of rows) {
      const t = Number(row['t=T/Theta'])
      expect(relativeDifference(debyeHeatCapacity(t), Number(row['C/(3nR)'])), `C at t = ${t}`).toBeLessThan(TOLERANCE)
      expect(relativeDifference(debyeEnergy(t), Number(row['U_th/(3nR Theta)'])), `U at t = ${t}`).toBeLessThan(TOLERANCE)
      expect(relativeDifference(debyeEntropy(t), Number(row['S/(3nR)'])), `S at t = ${t}`).toBeLessThan(TOLERANCE)
    }
  })
  it('keeps to its two limits far out', () => {
    expect(relativeDifference(debyeHeatCapacity(1e-6), 4 * Math.PI ** 4 / 5 * 1e-18)).toBeLessThan(1e-13)
    expect(debyeHeatCapacity(0)).toBe(0)
    expect(debyeHeatCapacity(1e6)).toBeCloseTo(1 - 1 / 20 * 1e-12, 13)
    expect(debyeEntropy(0)).toBe(0)
    expect(debyeEnergy(0)).toBe(0)
  })
})

describe('Einstein and Schottky', () => {
  it('has the Einstein heat capacity of the table', () => {
    for (const row of referenceTable('heat-capacity/b_einstein.csv')) {
      const t = Number(row['t=T/Theta_E'])
      expect(relativeDifference(einsteinHeatCapacity(t), Number(row['C/(3nR)'])), `t = ${t}`).toBeLessThan(TOLERANCE)
    }
    expect(einsteinHeatCapacity(0)).toBe(0)
    expect(einsteinHeatCapacity(Infinity)).toBe(1)
  })
  it.each([1, 2, 0.5, 3])('has the Schottky heat capacity of the table for g = %d', (ratio) => {
    for (const row of referenceTable('heat-capacity/b_schottky.csv')) {
      const t = Number(row['t=T/Delta'])
      expect(relativeDifference(schottkyHeatCapacity(t, ratio), Number(row[`C/R g1/g0=${ratio}`])), `t = ${t}`).toBeLessThan(TOLERANCE)
    }
  })
  it('peaks where and as high as the table says, and ends in the T⁻² tail', () => {
    for (const row of referenceTable('heat-capacity/b_schottky_peaks.csv')) {
      const ratio = Number(row['g1/g0'])
      const peak = Number(row['T_peak/Delta'])
      const height = schottkyHeatCapacity(peak, ratio)
      expect(relativeDifference(height, Number(row['C_peak/R']))).toBeLessThan(TOLERANCE)
      expect(relativeDifference(height * GAS_CONSTANT_J_PER_MOL_K, Number(row['C_peak J/(mol K)']))).toBeLessThan(TOLERANCE)
      expect(schottkyHeatCapacity(peak * 1.01, ratio)).toBeLessThan(height)
      expect(schottkyHeatCapacity(peak * 0.99, ratio)).toBeLessThan(height)
      const tail = Number(Object.entries(row).find(([head]) => head.startsWith('high-T tail'))![1])
      expect(schottkyHeatCapacity(1e5, ratio) * 1e10).toBeCloseTo(tail, 4)
    }
    expect(schottkyHeatCapacity(0, 1)).toBe(0)
    expect(() => schottkyHeatCapacity(1, 0)).toThrow('degeneracy ratio above zero')
    expect(() => einsteinHeatCapacity(-1)).toThrow('zero or more')
  })
})

describe('Debye temperature', () => {
  it('comes out as in the worked conversions', () => {
    // tests/reference/data/materials/j_conversions.csv
    expect(debyeTemperatureFromBeta3(0.047548, 1)!.value).toBeCloseTo(344.485, 3)
    expect(debyeTemperatureFromBeta3(0.0084679, 5)!.value).toBeCloseTo(1047, 2)
    expect(debyeTemperatureFromBeta3(0.0084679, 1)!.value).toBeCloseTo(612.29, 2)
  })
  it('is absent when β₃ is not above zero', () => {
    expect(debyeTemperatureFromBeta3(0, 1)).toBeUndefined()
    expect(debyeTemperatureFromBeta3(-0.1, 1)).toBeUndefined()
    expect(debyeTemperatureFromBeta3(Number.NaN, 1)).toBeUndefined()
    expect(() => debyeTemperatureFromBeta3(1, 0)).toThrow('Atoms per formula unit')
  })
  it('has a third of the relative standard error of β₃', () => {
    const theta = debyeTemperatureFromBeta3(0.05, 2, 0.0015)!
    expect(theta.standardError / theta.value).toBeCloseTo(0.01, 12)
  })
})
