import { describe, expect, it } from 'vitest'
import { moveCursor } from '#shared/board/cursor'

const size = { lanes: 4, days: 14 }
const press = (lane: number, day: number, key: string, ctrl = false) => {
  const move = moveCursor({ lane, day }, { key, ctrl }, size)
  return move && [move.cursor.lane, move.cursor.day, move.shiftDays]
}

describe('moveCursor', () => {
  it('goes by day and lane, and stops at the first and last lane', () => {
    expect(press(1, 5, 'ArrowRight')).toEqual([1, 6, 0])
    expect(press(1, 5, 'ArrowUp')).toEqual([0, 5, 0])
    expect(press(0, 5, 'ArrowUp')).toEqual([0, 5, 0])
    expect(press(3, 5, 'ArrowDown')).toEqual([3, 5, 0])
  })

  it('goes to the ends of a lane, and with Ctrl to the first and last of all', () => {
    expect(press(1, 5, 'Home')).toEqual([1, 0, 0])
    expect(press(1, 5, 'End')).toEqual([1, 13, 0])
    expect(press(1, 5, 'Home', true)).toEqual([0, 0, 0])
    expect(press(1, 5, 'End', true)).toEqual([3, 13, 0])
  })

  it('goes by a week, and moves the board where it would leave it, landing on the right date', () => {
    expect(press(1, 3, 'PageDown')).toEqual([1, 10, 0])
    expect(press(1, 10, 'PageDown')).toEqual([1, 10, 7])
    expect(press(1, 3, 'PageUp')).toEqual([1, 3, -7])
    // One day before the first: the board goes back a week, and that day is then its seventh.
    expect(press(1, 0, 'ArrowLeft')).toEqual([1, 6, -7])
    expect(press(1, 13, 'ArrowRight')).toEqual([1, 7, 7])
  })

  it('leaves other keys alone', () => {
    expect(press(1, 3, 'a')).toBeUndefined()
  })
})
