import type { FitTerm } from '#shared/heat-capacity/types'

/** Power of T that each term of C has. */
export const TERM_POWER: Readonly<Record<FitTerm, number>> = { gamma: 1, beta3: 3, beta5: 5, tail: -2, constant: 0 }

/** Unit of each coefficient, C in mJ/(mol K). */
export const TERM_UNIT: Readonly<Record<FitTerm, string>> = {
  gamma: 'mJ/(mol K²)',
  beta3: 'mJ/(mol K⁴)',
  beta5: 'mJ/(mol K⁶)',
  tail: 'mJ K/mol',
  constant: 'mJ/(mol K)',
}

/** How each term is written in a sentence. */
export const TERM_SYMBOL: Readonly<Record<FitTerm, string>> = { gamma: 'γT', beta3: 'β₃T³', beta5: 'β₅T⁵', tail: 'A/T²', constant: 'C₀' }

/**
 * The power of T of one term, at one temperature.
 *
 * @param term which term
 * @param temperatureK K, above 0
 * @returns Tⁿ in Kⁿ; times the coefficient it is in mJ/(mol K)
 */
export function termValue(term: FitTerm, temperatureK: number): number {
  switch (term) {
    case 'gamma': return temperatureK
    case 'beta3': return temperatureK * temperatureK * temperatureK
    case 'beta5': return temperatureK ** 5
    case 'tail': return 1 / (temperatureK * temperatureK)
    case 'constant': return 1
  }
}
