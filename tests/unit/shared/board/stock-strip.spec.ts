import { describe, expect, it } from 'vitest'
import { stockArea, stockAtMs, stockBand, stockLine, stripTop, thinPoints } from '#shared/board/stock-strip'

const frame = { x: (atMs: number) => atMs, y: (litres: number) => 100 - litres }
const points = [{ atMs: 0, litres: 40 }, { atMs: 10, litres: 20 }, { atMs: 10, litres: 60 }]

describe('the helium strip', () => {
  it('draws the stock as a line with steps, and the area down to nothing', () => {
    expect(stockLine(points, frame)).toBe('M0 60L10 80L10 40')
    expect(stockArea(points, frame)).toBe('M0 60L10 80L10 40L10 100L0 100Z')
    expect(stockArea([], frame)).toBe('')
  })

  it('draws the band forth along the high end and back along the low end', () => {
    expect(stockBand([{ atMs: 0, litres: 40, low: 35, high: 45 }, { atMs: 10, litres: 20, low: 5, high: 35 }], frame)).toBe('M0 55L10 65L10 95L0 65Z')
  })

  it('reads the stock between points and behind a step', () => {
    expect([0, 5, 10, 11, -1].map(atMs => stockAtMs(points, atMs))).toEqual([40, 30, 60, undefined, undefined])
  })

  it('ends the axis at a round number above everything', () => {
    // 1.08 × 205 = 221.4 → 250; 1.08 × 80 = 86.4 → 100; 1.08 × 470 = 507.6 → 600; at least 1.08 → 1.5.
    expect([[205, 80], [80], [470], []].map(stripTop)).toEqual([250, 100, 600, 1.5])
  })

  it('leaves out points on a straight line, and keeps bends, steps and ends', () => {
    const line = (...litres: number[]) => litres.map((value, index) => ({ atMs: index * 6, litres: value, low: value - 5 }))
    expect(thinPoints(line(100, 98, 96, 94, 80, 66), 0.1).map(({ atMs }) => atMs)).toEqual([0, 18, 30])
    // 0.3 off the line is kept at a tolerance of 0.1, and left out at 0.5.
    expect(thinPoints(line(100, 98.3, 96), 0.1)).toHaveLength(3)
    expect(thinPoints(line(100, 98.3, 96), 0.5)).toHaveLength(2)
    const step = [{ atMs: 0, litres: 10 }, { atMs: 6, litres: 10 }, { atMs: 6, litres: 50 }, { atMs: 12, litres: 50 }]
    expect(thinPoints(step, 0.1)).toEqual(step)
  })
})
