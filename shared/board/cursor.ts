/** The day of a lane that the keyboard is on. */
export interface BoardCursor { readonly lane: number, readonly day: number }

/** How many lanes and days the board shows. */
export interface BoardSize { readonly lanes: number, readonly days: number }

/** Where a key leads: the new place, and by how many days the board itself moves. */
export interface CursorMove { readonly cursor: BoardCursor, readonly shiftDays: number }

const WEEK = 7

/**
 * Moves the cursor over the board as a grid. Arrows go by day and lane, Home and End along the lane (with Ctrl to the
 * first and last of all), Page Up and Page Down by a week; leaving the board sideways moves the board by a week.
 *
 * @param cursor where it is
 * @param key name of the key as the browser gives it, and whether Ctrl (or ⌘) is held
 * @param size lanes and days shown
 * @returns where it goes, or undefined for a key that does not move
 */
export function moveCursor(cursor: BoardCursor, { key, ctrl }: { readonly key: string, readonly ctrl: boolean }, size: BoardSize): CursorMove | undefined {
  const stay = (next: Partial<BoardCursor>): CursorMove => ({ cursor: { ...cursor, ...next }, shiftDays: 0 })
  switch (key) {
    case 'ArrowUp': return stay({ lane: Math.max(0, cursor.lane - 1) })
    case 'ArrowDown': return stay({ lane: Math.min(size.lanes - 1, cursor.lane + 1) })
    case 'Home': return stay(ctrl ? { lane: 0, day: 0 } : { day: 0 })
    case 'End': return stay(ctrl ? { lane: size.lanes - 1, day: size.days - 1 } : { day: size.days - 1 })
    case 'ArrowLeft': return sideways(cursor, -1, size)
    case 'ArrowRight': return sideways(cursor, 1, size)
    case 'PageUp': return sideways(cursor, -WEEK, size)
    case 'PageDown': return sideways(cursor, WEEK, size)
    default: return undefined
  }
}

function sideways(cursor: BoardCursor, days: number, size: BoardSize): CursorMove {
  const day = cursor.day + days
  if (day >= 0 && day < size.days) return { cursor: { ...cursor, day }, shiftDays: 0 }
  const shiftDays = Math.sign(days) * WEEK
  return { cursor: { ...cursor, day: day - shiftDays }, shiftDays }
}
