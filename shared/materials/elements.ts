/** What a handbook says of an element or a simple insulator. */
export interface HandbookEntry {
  /** Formula unit, e.g. `Cu` or `Al2O3`. */
  readonly formula: string
  readonly name: string
  readonly kind: 'metal' | 'insulator'
  readonly atomsPerFormulaUnit: number
  /** Conduction electrons per formula unit; absent where a free-electron number means nothing (d metals near the end of the row). */
  readonly conductionElectrons?: number
  /** Density near room temperature, g/cm³. */
  readonly densityGPerCm3?: number
  /** Electronic coefficient γ, mJ/(mol K²); 0 for an insulator. */
  readonly gamma: number
  /** Lowest and highest γ of the sources, mJ/(mol K²). Allow about 5 % around it: the sources round. */
  readonly gammaRange: readonly [number, number]
  /** Debye temperature of the lowest temperatures, K. */
  readonly debyeTemperatureK: number
  /** Lowest and highest Θ_D of the sources, K. Allow about 5 % around it. */
  readonly debyeTemperatureRangeK: readonly [number, number]
  /** Superconducting transition, K; absent when none is known at ordinary pressure. */
  readonly criticalTemperatureK?: number
  readonly note?: string
  /** Where the values come from, and how sure they are. */
  readonly source: string
}

const METAL_SOURCE = 'C. Kittel, Introduction to Solid State Physics, ch. 5, 6 and 10; N. W. Ashcroft and N. D. Mermin, Solid State Physics, table 2.3 (both from memory; the range is what they and an unsourced public list disagree by)'
const INSULATOR_SOURCE = 'Θ_D from memory (C. Kittel, Introduction to Solid State Physics, ch. 5, and common data); γ of an insulator is zero'

type Extra = Pick<HandbookEntry, 'conductionElectrons' | 'criticalTemperatureK' | 'note'>

function metal(formula: string, name: string, densityGPerCm3: number, gamma: number, gammaRange: readonly [number, number], debyeTemperatureK: number, debyeTemperatureRangeK: readonly [number, number], extra: Extra): HandbookEntry {
  return { formula, name, kind: 'metal', atomsPerFormulaUnit: 1, densityGPerCm3, gamma, gammaRange, debyeTemperatureK, debyeTemperatureRangeK, ...extra, source: METAL_SOURCE }
}

function insulator(formula: string, name: string, atomsPerFormulaUnit: number, debyeTemperatureK: number, debyeTemperatureRangeK: readonly [number, number], note?: string): HandbookEntry {
  return { formula, name, kind: 'insulator', atomsPerFormulaUnit, gamma: 0, gammaRange: [0, 0], debyeTemperatureK, debyeTemperatureRangeK, note, source: INSULATOR_SOURCE }
}

/** The handbook table: γ in mJ/(mol K²), temperatures in K, densities in g/cm³. */
export const HANDBOOK: readonly HandbookEntry[] = [
  metal('Li', 'lithium', 0.534, 1.63, [1.63, 1.76], 344, [344, 344], { conductionElectrons: 1, criticalTemperatureK: 0.0004, note: 'martensitic phase change near 75 K' }),
  metal('Na', 'sodium', 0.971, 1.38, [1.38, 1.46], 158, [158, 158], { conductionElectrons: 1, note: 'martensitic phase change near 35 K' }),
  metal('K', 'potassium', 0.862, 2.08, [1.97, 2.08], 91, [91, 91], { conductionElectrons: 1 }),
  metal('Rb', 'rubidium', 1.532, 2.41, [2.41, 2.43], 56, [56, 56], { conductionElectrons: 1, note: 'T³ law only below about 1 K' }),
  metal('Cs', 'caesium', 1.873, 3.2, [3.2, 3.22], 38, [38, 38], { conductionElectrons: 1, note: 'T³ law only below about 0.5 K' }),
  metal('Cu', 'copper', 8.96, 0.695, [0.669, 0.695], 343, [343, 344.5], { conductionElectrons: 1, note: 'calorimetric reference: 0.6943 mJ/(mol K²) and 344.5 K' }),
  metal('Ag', 'silver', 10.5, 0.646, [0.646, 0.669], 225, [225, 225], { conductionElectrons: 1 }),
  metal('Au', 'gold', 19.3, 0.729, [0.669, 0.73], 165, [162.4, 170], { conductionElectrons: 1, note: 'Θ_D at 0 K is 162.4 K in newer data' }),
  metal('Be', 'beryllium', 1.848, 0.17, [0.17, 0.209], 1440, [1440, 1440], { conductionElectrons: 2, criticalTemperatureK: 0.026, note: 'semimetal-like: under the free-electron value' }),
  metal('Mg', 'magnesium', 1.738, 1.3, [1.3, 1.34], 400, [318, 400], { conductionElectrons: 2 }),
  metal('Ca', 'calcium', 1.55, 2.9, [2.72, 2.9], 230, [230, 230], { conductionElectrons: 2 }),
  metal('Zn', 'zinc', 7.13, 0.64, [0.586, 0.64], 327, [234, 327], { conductionElectrons: 2, criticalTemperatureK: 0.85, note: 'Θ_D depends strongly on temperature' }),
  metal('Cd', 'cadmium', 8.65, 0.688, [0.688, 0.711], 209, [209, 209], { conductionElectrons: 2, criticalTemperatureK: 0.517 }),
  metal('Al', 'aluminium', 2.699, 1.35, [1.26, 1.35], 428, [428, 428], { conductionElectrons: 3, criticalTemperatureK: 1.175, note: 'superconducting below 1.18 K: fit above' }),
  metal('Ga', 'gallium', 5.91, 0.596, [0.596, 0.628], 320, [320, 325], { conductionElectrons: 3, criticalTemperatureK: 1.083 }),
  metal('In', 'indium', 7.31, 1.69, [1.69, 1.8], 108, [108, 108], { conductionElectrons: 3, criticalTemperatureK: 3.408 }),
  metal('Tl', 'thallium', 11.85, 1.47, [1.46, 1.47], 78.5, [78.5, 96], { conductionElectrons: 3, criticalTemperatureK: 2.38 }),
  metal('Sn', 'white tin', 7.287, 1.78, [1.78, 1.84], 200, [200, 200], { conductionElectrons: 4, criticalTemperatureK: 3.722, note: 'white (beta) tin' }),
  metal('Pb', 'lead', 11.35, 2.98, [2.93, 2.98], 105, [105, 105], { conductionElectrons: 4, criticalTemperatureK: 7.196, note: 'β(T) is not constant above 2 K' }),
  metal('Bi', 'bismuth', 9.79, 0.008, [0.008, 0.0837], 119, [119, 119], { conductionElectrons: 5, criticalTemperatureK: 0.00053, note: 'semimetal: γ is near zero and the free-electron number means nothing' }),
  metal('Pd', 'palladium', 12.02, 9.42, [9.42, 9.42], 274, [274, 274], { note: 'exchange enhanced' }),
  metal('Pt', 'platinum', 21.45, 6.8, [6.8, 6.8], 240, [240, 240], {}),
  metal('Nb', 'niobium', 8.57, 7.79, [7.79, 8.37], 275, [275, 275], { conductionElectrons: 5, criticalTemperatureK: 9.25 }),
  metal('V', 'vanadium', 6.11, 9.26, [9.26, 9.26], 380, [380, 380], { conductionElectrons: 5, criticalTemperatureK: 5.4 }),
  metal('Ta', 'tantalum', 16.65, 5.9, [5.9, 5.9], 240, [240, 240], { conductionElectrons: 5, criticalTemperatureK: 4.47 }),
  metal('W', 'tungsten', 19.3, 1.01, [1, 1.3], 400, [400, 400], { conductionElectrons: 6, criticalTemperatureK: 0.0154, note: 'the handbook value 1.3 is superseded by 1.00 to 1.01' }),
  metal('Mo', 'molybdenum', 10.22, 2, [1.83, 2.1], 450, [450, 450], { conductionElectrons: 6, criticalTemperatureK: 0.915, note: 'newer values 1.83 to 2.1' }),
  metal('Ti', 'titanium', 4.51, 3.35, [3.35, 3.35], 420, [420, 420], { conductionElectrons: 4, criticalTemperatureK: 0.4 }),
  metal('Ni', 'nickel', 8.908, 7.02, [7.02, 7.02], 450, [450, 450], { note: 'ferromagnet' }),
  metal('Fe', 'iron', 7.874, 4.98, [4.98, 5.02], 470, [470, 470], { conductionElectrons: 2, note: 'ferromagnet' }),
  metal('Co', 'cobalt', 8.86, 4.73, [4.73, 4.73], 445, [445, 445], { note: 'ferromagnet; nuclear Schottky upturn below 1 K' }),
  metal('Mn', 'manganese', 7.44, 9.2, [9.2, 16.7], 410, [310, 410], { conductionElectrons: 2, note: 'the value is for γ-Mn; α-Mn has 12.8 to 14' }),
  insulator('Si', 'silicon', 1, 645, [636, 648]),
  insulator('Ge', 'germanium', 1, 374, [370, 374]),
  insulator('C', 'diamond', 1, 2230, [2200, 2250], 'graphite has no place here: it is a layered semimetal'),
  insulator('Al2O3', 'sapphire', 5, 1047, [1030, 1050], 'with r = 1 instead of 5 the same data would give 612 K'),
]

const BY_FORMULA: ReadonlyMap<string, HandbookEntry> = new Map(HANDBOOK.map(entry => [entry.formula, entry]))

const SUBSCRIPT_ZERO = '₀'.codePointAt(0)!

/** `Cu`, ` Cu1 ` and `Al₂O₃` name the same things as `Cu` and `Al2O3`. */
function plainFormula(formula: string): string {
  return formula
    .replace(/\s+/g, '')
    .replace(/[₀-₉]/g, digit => String(digit.codePointAt(0)! - SUBSCRIPT_ZERO))
    .replace(/([A-Za-z])1(?![\d.])/g, '$1')
}

/**
 * What the handbook says of a material.
 *
 * @param formula as typed, e.g. `Cu`, `Al2O3` or `Al₂O₃`; it must be written as the entry is, O3Al2 is not looked for
 * @returns the entry, or undefined for a material that is not in the table
 * @example handbookEntry('Cu')?.gamma // 0.695 mJ/(mol K²)
 */
export function handbookEntry(formula: string): HandbookEntry | undefined {
  return BY_FORMULA.get(plainFormula(formula))
}
