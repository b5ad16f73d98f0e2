import { DomainError } from '#shared/errors'

/** A stretch of the scale: T90/K = Σ A_i [(ln(p/Pa) − B)/C]^i between two temperatures. */
interface ScaleBranch {
  readonly lowestK: number
  readonly highestK: number
  /** ln(p/Pa) a little outside the stretch, between which the branch rises. */
  readonly bracket: readonly [number, number]
  readonly a: readonly number[]
  readonly b: number
  readonly c: number
}

/** The isotopes of helium whose vapour pressure defines temperature. */
export type HeliumIsotope = 'helium-3' | 'helium-4'

/**
 * Vapour-pressure scale of the ITS-90: H. Preston-Thomas, Metrologia 27, 3 (1990), table 3. The ⁴He coefficients agree in
 * four public sources. The ³He coefficients are from memory with one public copy, whose A₀ (1.053477) has two digits
 * exchanged: only 1.053447 gives the normal boiling point 3.197 K.
 */
const BRANCHES: Readonly<Record<HeliumIsotope, readonly ScaleBranch[]>> = {
  'helium-4': [
    {
      lowestK: 1.25, highestK: 2.1768, bracket: [4.6, 8.6], b: 5.6, c: 2.9,
      a: [1.392408, 0.527153, 0.166756, 0.050988, 0.026514, 0.001975, -0.017976, 0.005409, 0.013259],
    },
    {
      lowestK: 2.1768, highestK: 5.0, bracket: [8.5, 12.2], b: 10.3, c: 1.9,
      a: [3.146631, 1.357655, 0.413923, 0.091159, 0.016349, 0.001826, -0.004325, -0.004973],
    },
  ],
  'helium-3': [
    {
      lowestK: 0.65, highestK: 3.2, bracket: [4.7, 11.6], b: 7.3, c: 4.3,
      a: [1.053447, 0.980106, 0.676380, 0.372692, 0.151656, -0.002263, 0.006596, 0.088966, -0.004770, -0.054943],
    },
  ],
}

const SYMBOL: Readonly<Record<HeliumIsotope, string>> = { 'helium-3': '³He', 'helium-4': '⁴He' }

function temperatureOnBranch(branch: ScaleBranch, lnPressure: number): number {
  const x = (lnPressure - branch.b) / branch.c
  return branch.a.reduceRight((sum, coefficient) => sum * x + coefficient, 0)
}

/** Halving in ln p: each branch rises over its bracket only, so a method that leaves the bracket would go astray. */
function lnPressureOnBranch(branch: ScaleBranch, temperatureK: number): number {
  let [low, high] = branch.bracket
  for (let step = 0; step < 60; step++) {
    const middle = (low + high) / 2
    if (temperatureOnBranch(branch, middle) < temperatureK) low = middle
    else high = middle
  }
  return (low + high) / 2
}

function outOfScale(isotope: HeliumIsotope, path: string, range: string): DomainError {
  return new DomainError('invalid', `The ${SYMBOL[isotope]} vapour-pressure scale runs ${range}. Enter a value inside it.`, [path])
}

/**
 * Vapour pressure of ³He or ⁴He at a temperature on the ITS-90; the ⁴He scale changes branch at 2.1768 K.
 *
 * @param temperatureK Temperature T90, K: ⁴He 1.25 to 5.0, ³He 0.65 to 3.2.
 * @param isotope Which helium.
 * @returns Pressure, Pa.
 * @throws DomainError outside the range of the scale.
 */
export function vapourPressurePa(temperatureK: number, isotope: HeliumIsotope = 'helium-4'): number {
  const branch = BRANCHES[isotope].find(({ lowestK, highestK }) => temperatureK >= lowestK && temperatureK <= highestK)
  if (!branch) {
    throw outOfScale(isotope, 'temperatureK', isotope === 'helium-4' ? 'from 1.25 K to 5.0 K' : 'from 0.65 K to 3.2 K')
  }
  return Math.exp(lnPressureOnBranch(branch, temperatureK))
}

/**
 * Temperature of ³He or ⁴He from its vapour pressure, on the ITS-90.
 *
 * @param pressurePa Vapour pressure, Pa, above zero.
 * @param isotope Which helium.
 * @returns Temperature T90, K.
 * @throws DomainError outside the range of the scale.
 */
export function vapourPressureTemperatureK(pressurePa: number, isotope: HeliumIsotope = 'helium-4'): number {
  const branches = BRANCHES[isotope].map(branch => ({
    branch,
    lowest: lnPressureOnBranch(branch, branch.lowestK),
    highest: lnPressureOnBranch(branch, branch.highestK),
  }))
  const lowest = Math.min(...branches.map(branch => branch.lowest))
  const highest = Math.max(...branches.map(branch => branch.highest))
  const lnPressure = Math.log(pressurePa)
  // A pressure written down to five digits at an end of the scale must not fall out of it: 1e-4 in ln p is under 0.1 mK.
  if (!(lnPressure >= lowest - 1e-4 && lnPressure <= highest + 1e-4)) {
    throw outOfScale(isotope, 'pressurePa', `from ${Math.exp(lowest).toFixed(0)} Pa to ${Math.exp(highest).toFixed(0)} Pa`)
  }
  const found = branches.find(branch => lnPressure <= branch.highest) ?? branches.at(-1)
  return found ? temperatureOnBranch(found.branch, lnPressure) : Number.NaN
}
