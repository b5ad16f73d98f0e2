/**
 * Thins points for drawing: in each column of the screen the lowest and the highest stay, with the first and the last of
 * the column, so that no spike and no end is lost.
 *
 * @param left place of each point on the screen, px; in any order, one that is not finite is left out
 * @param top its height on the screen, px
 * @param columns columns of the plot, one a pixel
 * @returns indices of the points to draw, in their own order; all drawable ones when they are few
 */
export function thinPoints(left: ArrayLike<number>, top: ArrayLike<number>, columns: number): number[] {
  const drawable: number[] = []
  for (let index = 0; index < left.length; index += 1) if (Number.isFinite(left[index]) && Number.isFinite(top[index])) drawable.push(index)
  if (drawable.length <= 4 * columns) return drawable

  const seen = new Map<number, { first: number, last: number, low: number, high: number }>()
  for (const index of drawable) {
    const column = Math.floor(left[index]!)
    const held = seen.get(column)
    if (!held) {
      seen.set(column, { first: index, last: index, low: index, high: index })
      continue
    }
    held.last = index
    if (top[index]! < top[held.low]!) held.low = index
    if (top[index]! > top[held.high]!) held.high = index
  }
  const kept = new Set<number>()
  for (const { first, last, low, high } of seen.values()) kept.add(first).add(last).add(low).add(high)
  return [...kept].sort((a, b) => a - b)
}
