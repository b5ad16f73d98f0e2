import type { CorrectionSuggestion, HeatCapacitySample } from '#shared/heat-capacity/types'

/** A slip that multiplies every heat capacity by one factor. */
export interface Slip {
  readonly id: CorrectionSuggestion['id']
  /** What the values were multiplied by through the slip. */
  readonly ratio: number
  /** E.g. `a factor of 1000 (mJ taken for J)`. */
  readonly words: string
  /** What to press, as a sentence. */
  readonly remedy: string
}

/**
 * The slips that people make with units and masses, for one sample.
 *
 * @param sample its molar mass and atoms per formula unit decide two of them
 * @param massEntersConversion whether the table is per whole sample, so that the mass was used
 */
export function slipsFor(sample: Pick<HeatCapacitySample, 'molarMassGPerMol' | 'atomsPerFormulaUnit'>, massEntersConversion = false): Slip[] {
  const { molarMassGPerMol: molarMass, atomsPerFormulaUnit: atoms } = sample
  const byMass = massEntersConversion ? { id: 'mass-unit-milligram-gram' as const } : undefined
  return [
    { id: byMass?.id ?? 'divide-by-1000', ratio: 1000, words: byMass ? 'a factor of 1000 (the mass typed in g for mg, or mJ taken for J)' : 'a factor of 1000 (mJ taken for J)', remedy: 'Divide all heat capacities by 1000.' },
    { id: byMass?.id ?? 'multiply-by-1000', ratio: 1 / 1000, words: byMass ? 'a factor of 1/1000 (the mass typed in mg for g, or J taken for mJ)' : 'a factor of 1/1000 (J taken for mJ)', remedy: 'Multiply all heat capacities by 1000.' },
    { id: 'per-gram-to-per-mole', ratio: 1 / molarMass, words: `one over the molar mass (values per gram taken for per mole)`, remedy: `Read the values as per gram: multiply them by the molar mass, ${round(molarMass)} g/mol.` },
    { id: 'per-mole-to-per-gram', ratio: molarMass, words: `the molar mass (values per mole taken for per gram)`, remedy: `Read the values as per mole: divide them by the molar mass, ${round(molarMass)} g/mol.` },
    ...(atoms > 1.5
      ? [
          { id: 'per-atom-to-per-formula-unit' as const, ratio: 1 / atoms, words: `one over the ${round(atoms)} atoms of a formula unit (values per mole of atoms taken for per mole of formula units)`, remedy: `Read the values as per mole of atoms: multiply them by ${round(atoms)}.` },
          { id: 'per-formula-unit-to-per-atom' as const, ratio: atoms, words: `the ${round(atoms)} atoms of a formula unit (values per mole of formula units taken for per mole of atoms)`, remedy: `Read the values as per mole of formula units: divide them by ${round(atoms)}.` },
        ]
      : []),
    { id: 'calorie-to-joule', ratio: 1 / 4.184, words: 'the calorie (cal taken for J)', remedy: 'Read the values as calories: multiply them by 4.184.' },
  ]
}

/** How near a ratio must be to a slip's to be named after it. */
const NEAR = 1.35

/**
 * The slip whose factor a ratio is close to.
 *
 * @param ratio measured over expected
 * @param sample see `slipsFor`
 * @returns the closest within 35 %, or undefined
 */
export function slipNear(ratio: number, sample: Pick<HeatCapacitySample, 'molarMassGPerMol' | 'atomsPerFormulaUnit'>): Slip | undefined {
  const distance = (slip: Slip) => Math.abs(Math.log(ratio / slip.ratio))
  const [nearest] = slipsFor(sample).sort((a, b) => distance(a) - distance(b))
  return nearest && distance(nearest) < Math.log(NEAR) ? nearest : undefined
}

function round(value: number): string {
  return String(Number(value.toPrecision(5)))
}
