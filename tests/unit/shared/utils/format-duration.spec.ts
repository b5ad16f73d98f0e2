import { describe, expect, it } from 'vitest'
import { formatDuration } from '#shared/utils/format-duration'

const MIN = 60
const H = 60 * MIN
const D = 24 * H

describe('a duration for people', () => {
  it.each([
    [0, '0\u2009min'], [29, '0\u2009min'], [30, '1\u2009min'], [28 * MIN, '28\u2009min'], [H, '1\u2009h'], [5 * H + 20 * MIN, '5\u2009h 20\u2009min'],
    [59 * MIN + 40, '1\u2009h'], // 59 min 40 s rounds to 60 min
    [D - MIN, '23\u2009h 59\u2009min'], [D - 20, '1\u2009d'], [D, '1\u2009d'], [3 * D + 4 * H, '3\u2009d 4\u2009h'],
    [3 * D + 4 * H + 29 * MIN, '3\u2009d 4\u2009h'], [3 * D + 4 * H + 30 * MIN, '3\u2009d 5\u2009h'], [2 * D - 10 * MIN, '2\u2009d'],
    [-28 * MIN, '\u221228\u2009min'], [-(D + H), '\u22121\u2009d 1\u2009h'], [-20, '0\u2009min'],
  ])('of %d s is %j', (durationS, text) => {
    expect(formatDuration(durationS)).toBe(text)
  })
})
