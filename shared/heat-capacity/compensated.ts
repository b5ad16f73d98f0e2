/**
 * Sums of products in about twice the working precision, by error-free transformations.
 * Source: T. Ogita, S. M. Rump and S. Oishi, SIAM J. Sci. Comput. 26, 1955 (2005), algorithms TwoSum, TwoProduct and Dot2.
 */

/** 2²⁷ + 1: splits a double into two halves of 26 bits (Dekker). */
const SPLITTER = 134217729

/**
 * b − r − A x for each row.
 *
 * @param columns A, column by column
 * @param values b
 * @param solution x
 * @param residuals r
 * @returns one value a row, rounded once from the doubled sum
 */
export function dotResidual(columns: readonly Float64Array[], values: Float64Array, solution: Float64Array, residuals: Float64Array): Float64Array {
  const result = new Float64Array(values.length)
  const size = columns.length
  const high = new Float64Array(size)
  const low = new Float64Array(size)
  for (let j = 0; j < size; j += 1) {
    const stretched = SPLITTER * solution[j]!
    high[j] = stretched - (stretched - solution[j]!)
    low[j] = solution[j]! - high[j]!
  }
  for (let i = 0; i < values.length; i += 1) {
    let sum = values[i]!
    const other = -residuals[i]!
    let next = sum + other
    let virtual = next - sum
    let error = (sum - (next - virtual)) + (other - virtual)
    sum = next
    for (let j = 0; j < size; j += 1) {
      const a = columns[j]![i]!
      const product = -(a * solution[j]!)
      const stretched = SPLITTER * a
      const aHigh = stretched - (stretched - a)
      const aLow = a - aHigh
      const lost = -(aLow * low[j]! - (((-product - aHigh * high[j]!) - aLow * high[j]!) - aHigh * low[j]!))
      next = sum + product
      virtual = next - sum
      error += (sum - (next - virtual)) + (product - virtual) + lost
      sum = next
    }
    result[i] = sum + error
  }
  return result
}

/**
 * −Aᵀ r, one value a column.
 *
 * @param columns A, column by column
 * @param residuals r
 */
export function transposedResidual(columns: readonly Float64Array[], residuals: Float64Array): Float64Array {
  const result = new Float64Array(columns.length)
  columns.forEach((column, j) => {
    let sum = 0
    let error = 0
    for (let i = 0; i < column.length; i += 1) {
      const a = column[i]!
      const b = residuals[i]!
      const product = a * b
      let stretched = SPLITTER * a
      const aHigh = stretched - (stretched - a)
      const aLow = a - aHigh
      stretched = SPLITTER * b
      const bHigh = stretched - (stretched - b)
      const bLow = b - bHigh
      const next = sum + product
      const virtual = next - sum
      error += (sum - (next - virtual)) + (product - virtual) + (aLow * bLow - (((product - aHigh * bHigh) - aLow * bHigh) - aHigh * bLow))
      sum = next
    }
    result[j] = -(sum + error)
  })
  return result
}
