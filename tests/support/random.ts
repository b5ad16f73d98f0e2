/** A seeded source of numbers: the same seed gives the same sequence on every machine. */
export interface SeededRandom {
  /** Uniform in [0, 1). */
  next(): number
  /** Standard normal. */
  normal(): number
}

/** mulberry32 (T. Ettinger, public domain) with Box and Muller's transform. */
export function seededRandom(seed: number): SeededRandom {
  let state = seed >>> 0
  const next = () => {
    state = (state + 0x6d2b79f5) >>> 0
    let mixed = Math.imul(state ^ (state >>> 15), state | 1)
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61)
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4294967296
  }
  return { next, normal: () => Math.sqrt(-2 * Math.log(1 - next())) * Math.cos(2 * Math.PI * next()) }
}
