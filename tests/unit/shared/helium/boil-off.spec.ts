import { describe, expect, it } from 'vitest'
import { boilOffStretches, closedVolumeRemark, judgeBoilOff, median, usualBoilOffBand } from '#shared/helium/boil-off'
import { MS_PER_HOUR as H } from '#shared/units/helium-units'

describe('boil-off between readings', () => {
  it('leaves out every stretch a transfer touches', () => {
    const readings = [{ atMs: 8 * H, litres: 28 }, { atMs: 0, litres: 20 }, { atMs: 4 * H, litres: 18 }, { atMs: 12 * H, litres: 25 }]
    expect(boilOffStretches(readings, [{ startMs: 5 * H, endMs: 6 * H }])).toEqual([
      { fromMs: 0, toMs: 4 * H, litresPerHour: 0.5 },
      { fromMs: 8 * H, toMs: 12 * H, litresPerHour: 0.75 },
    ])
  })

  it('joins readings closer than half an hour to the next', () => {
    const readings = [{ atMs: 0, litres: 10 }, { atMs: 0.1 * H, litres: 9.7 }, { atMs: 2 * H, litres: 9 }]
    expect(boilOffStretches(readings, [])).toEqual([{ fromMs: 0, toMs: 2 * H, litresPerHour: 0.5 }])
  })

  it('says nothing from one reading, and refuses what is no number', () => {
    expect(boilOffStretches([{ atMs: 0, litres: 1 }], [])).toEqual([])
    expect(() => boilOffStretches([{ atMs: 0, litres: Number.NaN }], [])).toThrow(/Correct that reading/)
  })
})

describe('the usual band', () => {
  it('is the median ± 3 robust standard deviations', () => {
    // Median 0.5; deviations 0.2, 0.1, 0, 0.1, 0.2, median 0.1; half-width 3 × 1.4826 × 0.1 = 0.44478.
    const band = usualBoilOffBand([0.3, 0.4, 0.5, 0.6, 0.7])
    expect(band?.medianLitresPerHour).toBe(0.5)
    expect(band?.highLitresPerHour).toBeCloseTo(0.94478, 4)
    expect(band?.lowLitresPerHour).toBeCloseTo(0.05522, 4)
    expect(band?.count).toBe(5)
  })

  it('is not widened by one quench', () => {
    const calm = [0.48, 0.49, 0.5, 0.5, 0.51, 0.52]
    const high = usualBoilOffBand([...calm, 40])?.highLitresPerHour as number
    expect(high).toBeLessThan(0.6)
  })

  it('has a least width, and needs five stretches', () => {
    const band = usualBoilOffBand([0.5, 0.5, 0.5, 0.5, 0.5])
    expect([band?.lowLitresPerHour, band?.highLitresPerHour]).toEqual([0.45, 0.55])
    expect(usualBoilOffBand([0.5, 0.5, 0.5, 0.5])).toBeUndefined()
  })

  it('takes the mean of the middle two as median', () => {
    expect(median([4, 1, 3, 2])).toBe(2.5)
    expect(median([])).toBeNaN()
  })
})

describe('judging a boil-off', () => {
  const band = { lowLitresPerHour: 0.4, medianLitresPerHour: 0.5, highLitresPerHour: 0.6, count: 12 }

  it('flags outside the band with the number, the band and what to look at', () => {
    expect(judgeBoilOff(0.5, band, 'Petrel')).toMatchObject({ status: 'usual' })
    const high = judgeBoilOff(1.202, band, 'Petrel')
    // (1.202 − 0.5)/1.404 = 0.50 W.
    expect(high).toMatchObject({ status: 'high', why: expect.stringMatching(/Petrel boils off 1\.20.L\/h, over its usual 0\.40 to 0\.60.L\/h \(12 stretches\); about 0\.50.W more than usual/) })
    expect(judgeBoilOff(0.1, band, 'Petrel')).toMatchObject({ status: 'low', why: expect.stringContaining('blocked vent') })
    expect(judgeBoilOff(-0.3, band, 'Petrel')).toMatchObject({ status: 'rising', why: expect.stringContaining('log the transfer') })
    expect(judgeBoilOff(0.3, undefined, 'Petrel')).toMatchObject({ status: 'no-band' })
  })

  it('keeps the ends of the band inside it', () => {
    expect(judgeBoilOff(0.6, band, 'Petrel').status).toBe('usual')
    expect(judgeBoilOff(0.4, band, 'Petrel').status).toBe('usual')
  })

  it('says what a falling level means where vapour fills the space', () => {
    // 1.404 L/h takes 1.0 W and sends out 1.404 × 0.8644 = 1.21 L/h.
    expect(closedVolumeRemark(1.404)).toMatch(/about 1\.0.W.*only 1\.21.L\/h/)
  })
})
