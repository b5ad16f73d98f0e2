import { describe, expect, it } from 'vitest'
import { gasEnthalpyJPerKg } from '#shared/helium/gas-enthalpy'
import { monotoneCurve } from '#shared/helium/monotone-curve'
import { oxygenAfterRelease, oxygenDuringRelease } from '#shared/helium/oxygen'
import { boilOffLitresPerHour, gasDensityKgPerM3, heatLoadW } from '#shared/helium/properties'
import { vapourPressurePa, vapourPressureTemperatureK } from '#shared/helium/vapour-pressure'
import { heliumGFromMg, heliumLitresFromMg, heliumMgFromG, heliumMgFromLitres, litresText } from '#shared/units/helium-units'

describe('helium units', () => {
  it('converts litres, grams and milligrams', () => {
    expect(heliumMgFromLitres(1)).toBe(124_669) // density 124.669 g/L
    expect(heliumLitresFromMg(1_246_690)).toBeCloseTo(10, 12)
    expect(heliumGFromMg(1500)).toBe(1.5)
    expect(heliumMgFromG(1.5)).toBe(1500)
  })

  it('writes litres with a thin space and the proper minus', () => {
    expect(litresText(12.34)).toBe('12.3\u2009L')
    expect(litresText(250.4)).toBe('250\u2009L')
    expect(litresText(-3.21)).toBe('−3.2\u2009L')
    expect(litresText(-0.01)).toBe('0.0\u2009L')
  })
})

describe('helium properties', () => {
  it('turns watts into boil-off and back', () => {
    expect(heatLoadW(boilOffLitresPerHour(0.35))).toBeCloseTo(0.35, 12)
  })

  it('changes branch of the ⁴He scale at 2.1768 K without a step', () => {
    const [below, above] = [vapourPressurePa(2.1768), vapourPressurePa(2.17681)]
    expect(above / below - 1).toBeGreaterThan(0)
    expect(above / below - 1).toBeLessThan(1e-4)
    expect(vapourPressureTemperatureK(below)).toBeCloseTo(2.1768, 5)
  })

  it('refuses what lies outside a scale', () => {
    expect(() => vapourPressurePa(1.2)).toThrow(/from 1\.25 K to 5\.0 K/)
    expect(() => vapourPressurePa(0.6, 'helium-3')).toThrow(/from 0\.65 K to 3\.2 K/)
    expect(() => vapourPressureTemperatureK(0)).toThrow(/Enter a value inside it/)
    expect(() => vapourPressureTemperatureK(Number.NaN)).toThrow(/Enter a value inside it/)
    expect(() => vapourPressureTemperatureK(-5)).toThrow(/Enter a value inside it/)
    expect(() => gasDensityKgPerM3(20)).toThrow(/250 K to 320 K/)
    expect(() => gasEnthalpyJPerKg(301)).toThrow(/300 K/)
    expect(gasEnthalpyJPerKg(4)).toBe(0)
  })

  it('draws a curve through its points without overshoot', () => {
    const curve = monotoneCurve([0, 1, 2, 3], [0, 0, 5, 5])
    expect([0, 1, 2, 3].map(curve)).toEqual([0, 0, 5, 5])
    for (let x = 0; x <= 3; x += 0.05) expect(curve(x)).toBeGreaterThanOrEqual(0)
    for (let x = 0; x <= 3; x += 0.05) expect(curve(x)).toBeLessThanOrEqual(5)
    expect(() => monotoneCurve([0, 0], [1, 2])).toThrow(RangeError)
    expect(() => monotoneCurve([0], [1])).toThrow(RangeError)
  })
})

describe('words of the oxygen estimate', () => {
  it('state model and limits, defer to local codes, and never say "safe"', () => {
    const texts = [
      oxygenAfterRelease({ roomM3: 1000, liquidL: 1, fluid: 'helium' }).text,
      oxygenAfterRelease({ roomM3: 60, liquidL: 50, fluid: 'nitrogen' }).text,
      oxygenDuringRelease({ roomM3: 100, releaseM3PerHour: 10, ventilationM3PerHour: 300, fan: 'blows-in', hours: 1, fluid: 'helium' }).text,
      oxygenDuringRelease({ roomM3: 100, releaseM3PerHour: 10, ventilationM3PerHour: 0, fan: 'draws-out', hours: Infinity, fluid: 'nitrogen' }).text,
    ]
    for (const text of texts) {
      expect(text).not.toMatch(/safe/i)
      expect(text).toMatch(/Model: .*Limits: .*local codes/)
    }
    expect(texts[0]).toMatch(/ceiling/)
    expect(texts[1]).toMatch(/floor and in pits/)
    expect(texts[3]).toMatch(/in the long run/)
  })

  it('refuses rooms, releases and air that cannot be', () => {
    expect(() => oxygenAfterRelease({ roomM3: 0, liquidL: 1, fluid: 'helium' })).toThrow(/cubic metres/)
    expect(() => oxygenAfterRelease({ roomM3: 10, liquidL: -1, fluid: 'helium' })).toThrow(/litres/)
    expect(() => oxygenAfterRelease({ roomM3: 10, liquidL: 1, fluid: 'helium', initialOxygenPercent: 25 })).toThrow(/20\.95/)
    const release = { roomM3: 10, releaseM3PerHour: 1, ventilationM3PerHour: 1, fan: 'blows-in', hours: 1, fluid: 'helium' } as const
    expect(() => oxygenDuringRelease({ ...release, releaseM3PerHour: 0 })).toThrow(/release/)
    expect(() => oxygenDuringRelease({ ...release, ventilationM3PerHour: -1 })).toThrow(/ventilation/)
    expect(() => oxygenDuringRelease({ ...release, hours: Number.NaN })).toThrow(/hours/)
  })
})
