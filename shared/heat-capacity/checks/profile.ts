import type { HeatCapacityCurve } from '#shared/heat-capacity/types'
import { median } from '#shared/heat-capacity/statistics'

/** Mean of neighbouring points. */
export interface ProfileBin {
  readonly temperatureK: number
  /** C/T, mJ/(mol K²). */
  readonly ratio: number
  /** Standard error of `ratio`: the stated σ or the scatter of the bins, whichever is larger. */
  readonly standardError: number
  readonly count: number
}

const MOST_BINS = 60

/**
 * C/T against T in bins of equal width in ln T, for judging shapes whatever the number of points.
 *
 * @param curve temperatures in K, heat capacities and σ in mJ/(mol K)
 * @param rangeK lowest and highest temperature, K, both included
 * @returns bins by rising temperature; points that are not above zero count as they are
 */
export function profileOf(curve: HeatCapacityCurve, rangeK: readonly [number, number]): ProfileBin[] {
  const inside = curve.temperatureK.map((_, index) => index).filter(index => curve.temperatureK[index]! >= rangeK[0] && curve.temperatureK[index]! <= rangeK[1])
  if (inside.length === 0) return []
  const first = Math.log(curve.temperatureK[inside[0]!]!)
  const width = (Math.log(curve.temperatureK[inside[inside.length - 1]!]!) - first) / MOST_BINS
  const bins: { temperature: number, ratio: number, variance: number, count: number, slot: number }[] = []
  for (const index of inside) {
    const temperature = curve.temperatureK[index]!
    // A few points stay single: merging them would only blur.
    const slot = inside.length <= MOST_BINS ? index : width > 0 ? Math.min(MOST_BINS - 1, Math.floor((Math.log(temperature) - first) / width)) : 0
    let bin = bins.at(-1)
    const same = inside.length <= MOST_BINS ? bin !== undefined && bin.temperature / bin.count === temperature : bin?.slot === slot
    if (!bin || !same) {
      bin = { temperature: 0, ratio: 0, variance: 0, count: 0, slot }
      bins.push(bin)
    }
    bin.temperature += temperature
    bin.ratio += curve.heatCapacity[index]! / temperature
    bin.variance += curve.sigma ? (curve.sigma[index]! / temperature) ** 2 : 0
    bin.count += 1
  }
  const means = bins.map(bin => ({ temperatureK: bin.temperature / bin.count, ratio: bin.ratio / bin.count, stated: Math.sqrt(bin.variance) / bin.count, count: bin.count }))
  const noise = scatterOf(means)
  return means.map(({ stated, ...bin }) => ({ ...bin, standardError: Math.max(stated, noise * Math.abs(bin.ratio)) }))
}

/** Relative scatter of bins about the line through their neighbours; robust, so that one step or spike does not hide in it. */
function scatterOf(bins: readonly { temperatureK: number, ratio: number }[]): number {
  const departures: number[] = []
  for (let index = 1; index < bins.length - 1; index += 1) {
    const [before, here, after] = [bins[index - 1]!, bins[index]!, bins[index + 1]!]
    const share = (here.temperatureK - before.temperatureK) / (after.temperatureK - before.temperatureK)
    const between = before.ratio + share * (after.ratio - before.ratio)
    departures.push(Math.abs((here.ratio - between) / (here.ratio || 1)) / Math.sqrt(1 + share ** 2 + (1 - share) ** 2))
  }
  // The median of |normal| is 0.6745 σ.
  return departures.length === 0 ? 0 : median(departures) / 0.6745
}
