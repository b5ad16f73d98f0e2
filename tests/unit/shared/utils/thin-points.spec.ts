import { describe, expect, it } from 'vitest'
import { thinPoints } from '#shared/utils/thin-points'

describe('thinning points for the screen', () => {
  const count = 10_000
  const left = Array.from({ length: count }, (_, at) => at * 700 / count)
  const top = left.map((_, at) => 100 + 30 * Math.sin(at / 300))

  it('keeps a single spike among ten thousand', () => {
    const spiky = [...top]
    spiky[5432] = -500
    spiky[8011] = 900
    const kept = thinPoints(left, spiky, 700)
    expect(kept).toContain(5432)
    expect(kept).toContain(8011)
  })
  it('draws at most four points a column, in order, with both ends', () => {
    const kept = thinPoints(left, top, 700)
    expect(kept.length).toBeLessThanOrEqual(4 * 700)
    expect(kept).toEqual([...kept].sort((a, b) => a - b))
    expect(kept[0]).toBe(0)
    expect(kept.at(-1)).toBe(count - 1)
  })
  it('keeps the lowest and the highest of each column', () => {
    const kept = new Set(thinPoints(left, top, 700))
    for (let column = 0; column < 700; column += 1) {
      const members = left.map((_, at) => at).filter(at => Math.floor(left[at]!) === column)
      const heights = (indices: number[]) => indices.map(at => top[at]!)
      expect(Math.min(...heights(members.filter(at => kept.has(at))))).toBe(Math.min(...heights(members)))
      expect(Math.max(...heights(members.filter(at => kept.has(at))))).toBe(Math.max(...heights(members)))
    }
  })
  it('leaves few points alone, but for those that cannot be drawn', () => {
    expect(thinPoints([1, 2, NaN, 4], [1, NaN, 1, 1], 700)).toEqual([0, 3])
  })
})
