/** A run's number as people write it: `0218`. */
export function runNumber(number: number): string {
  return String(number).padStart(4, '0')
}
