import { MF } from 'mf-parser'
import { DomainError } from '#shared/errors'

/** What a chemical formula says of a sample. */
export interface FormulaFacts {
  /** The formula as it was understood, e.g. `CuSO4 . 5H2O`. */
  readonly formula: string
  /** From standard atomic weights (isotopes by their own mass), g/mol. */
  readonly molarMassGPerMol: number
  /** Atoms per formula unit, r; fractional where subscripts are. */
  readonly atomsPerFormulaUnit: number
}

/** What the library returns of a formula; its own types leave this open. */
interface FormulaInfo { readonly mass: number, readonly charge: number, readonly atoms: Readonly<Record<string, number>> }

const SUBSCRIPTS = '₀₁₂₃₄₅₆₇₈₉'

/**
 * Writes a formula the way the parser needs it. It reads `.5` and `·` wrong without a word, so a hydrate's dot gets
 * spaces, a fraction its leading zero, and other spaces go.
 *
 * @param formula as typed: subscript digits, `·`, decimal commas and spaces allowed
 * @returns e.g. `CuSO4 . 5H2O` for `CuSO₄·5H₂O`
 */
export function plainFormula(formula: string): string {
  const compact = formula.trim()
    .replace(/[₀-₉]/g, digit => String(SUBSCRIPTS.indexOf(digit)))
    .replace(/(\d),(\d)/g, '$1.$2')
    .replace(/\s*[·⋅∙•*]\s*|\s+\.\s*|\s*\.\s+/g, '|')
    // Water after a dot is water of crystallisation: CuSO4.5H2O is a hydrate, not O4.5H2O.
    .replace(/(?<=[A-Za-z\d)\]])(?<!\|\d*)\.(?=\d*(?:\.\d+)?(?:H2O|D2O)$)/, '|')
    .replace(/\s+/g, '')
    .replace(/(?<=[\d)\]a-zA-Z])\.(?=[A-Z([])/g, '|')
  return compact.replace(/(^|[^\d])\.(\d)/g, '$10.$2').split('|').join(' . ')
}

/**
 * Molar mass and atoms per formula unit of a chemical formula.
 * Atomic weights: chemical-elements (isotope-weighted NIST values), within 2 × 10⁻⁴ of IUPAC 2016.
 *
 * @param formula e.g. `Cu`, `La1.85Sr0.15CuO4`, `CuSO4·5H2O` or `[13C]`
 * @returns formula as understood, molar mass (g/mol), atoms per formula unit
 * @throws DomainError when it is empty, too long or no formula
 * @example parseFormula('Al2O3') // { formula: 'Al2O3', molarMassGPerMol: 101.961, atomsPerFormulaUnit: 5 }
 */
export function parseFormula(formula: string): FormulaFacts {
  const path = ['formula']
  const typed = formula.trim()
  if (typed === '') throw new DomainError('invalid', 'Enter the chemical formula of the sample, such as Cu or Al2O3.', path)
  if (typed.length > 120) throw new DomainError('invalid', 'The formula is longer than 120 characters. Enter one formula unit.', path)
  const plain = plainFormula(typed)
  const info = read(plain, typed)
  const atoms = Object.values(info.atoms).reduce((sum, count) => sum + count, 0)
  if (!(info.mass > 0 && Number.isFinite(info.mass) && atoms > 0 && Number.isFinite(atoms))) throw noFormula(typed)
  if (info.charge !== 0) throw new DomainError('invalid', `“${typed}” carries a charge. Enter the neutral formula unit.`, path)
  return { formula: plain, molarMassGPerMol: info.mass, atomsPerFormulaUnit: Number(atoms.toFixed(9)) }
}

function read(plain: string, typed: string): FormulaInfo {
  try {
    return new MF(plain).getInfo() as FormulaInfo
  }
  catch {
    throw noFormula(typed)
  }
}

function noFormula(typed: string): DomainError {
  return new DomainError('invalid', `“${typed}” is no chemical formula. Write element symbols with a capital and numbers after them, such as Al2O3 or La1.85Sr0.15CuO4.`, ['formula'])
}

/** A mass with its standard uncertainty where one was stated, mg. */
export interface Mass { readonly massMg: number, readonly massUncertaintyMg?: number }

const MILLIGRAMS: Readonly<Record<string, number>> = { µg: 1e-3, ug: 1e-3, mg: 1, g: 1000, kg: 1e6 }

/**
 * Reads a mass with its unit: `412.6mg`, `0.4126 g`, `412.6(2) mg`, `412.6 ± 0.2 mg`.
 *
 * @param text as typed; a unit must be there, since a bare number is how a factor of 1000 slips in
 * @returns mass and uncertainty, mg
 * @throws DomainError when it is no mass above zero
 */
export function parseMass(text: string): Mass {
  const match = /^\s*(\d+(?:[.,]\d+)?)(?:\((\d+)\)|\s*(?:±|\+-|\+\/-)\s*(\d+(?:[.,]\d+)?))?\s*(µg|ug|mg|g|kg)\s*$/.exec(text.replace(/\u03bc/g, 'µ'))
  const scale = MILLIGRAMS[match?.[4] ?? '']
  if (!match || !scale) throw new DomainError('invalid', `“${text}” is no mass. Write a number with its unit, such as 412.6mg or 0.4126g.`, ['mass'])
  const digits = match[1]!.replace(',', '.')
  const massMg = Number(digits) * scale
  if (!(massMg > 0)) throw new DomainError('invalid', 'The mass must be above zero. Write it with its unit, such as 412.6mg.', ['mass'])
  const decimals = digits.split('.')[1]?.length ?? 0
  const uncertainty = match[2] ? Number(match[2]) / 10 ** decimals : match[3] ? Number(match[3].replace(',', '.')) : undefined
  return { massMg, massUncertaintyMg: uncertainty === undefined ? undefined : uncertainty * scale }
}
