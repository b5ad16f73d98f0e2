/** A deterministic source of numbers: the same seed gives the same facility. */
export interface Random {
  /** Evenly from low to high. */
  between(low: number, high: number): number
  /** A whole number from low to high, both included. */
  integer(low: number, high: number): number
  /** From a normal distribution. */
  normal(mean: number, standardDeviation: number): number
  /** One of the values. */
  pick<T>(values: readonly T[]): T
  /** True with this chance. */
  chance(probability: number): boolean
}

/** Mulberry32 (public domain, T. Ettinger): small, fast, good enough for invented data. */
export function seededRandom(seed: number): Random {
  let state = seed >>> 0
  const next = () => {
    state = (state + 0x6D2B79F5) >>> 0
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state)
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4294967296
  }
  const between = (low: number, high: number) => low + next() * (high - low)
  const integer = (low: number, high: number) => Math.floor(between(low, high + 1))
  return {
    between,
    integer,
    // Box–Muller; 1 − u keeps the logarithm finite.
    normal: (mean, standardDeviation) => mean + standardDeviation * Math.sqrt(-2 * Math.log(1 - next())) * Math.cos(2 * Math.PI * next()),
    pick: (values) => {
      const value = values[integer(0, values.length - 1)]
      if (value === undefined) throw new Error('nothing to pick from')
      return value
    },
    chance: probability => next() < probability,
  }
}
