import { createHash } from 'node:crypto'

/** The arrays of a curve as a dataset keeps them; null before its columns are confirmed. */
export interface StoredCurve {
  temperatureK: readonly number[] | null
  heatCapacity: readonly number[] | null
  sigma: readonly number[] | null
}

/**
 * SHA-256 over the numbers of a curve, little-endian doubles: names exactly what was fitted.
 *
 * @param curve temperatures in K, heat capacities and sigmas in mJ/(mol K)
 * @returns lower-case hexadecimal; the hash of nothing before the columns are confirmed
 */
export function curveSha256(curve: StoredCurve): string {
  const hash = createHash('sha256')
  for (const numbers of [curve.temperatureK, curve.heatCapacity, curve.sigma]) {
    const values = Float64Array.from(numbers ?? [])
    hash.update(`${values.length};`)
    hash.update(new Uint8Array(values.buffer))
  }
  return hash.digest('hex')
}
