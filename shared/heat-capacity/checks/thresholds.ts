/** One limit that a check judges by. */
export interface ThresholdRow {
  readonly value: number
  readonly unit: string
  /** What it limits, for the manager's table. */
  readonly words: string
  readonly source: string
  /** Lowest and highest value that a manager may set. */
  readonly range: readonly [number, number]
}

const PRACTICE = 'common practice, no source'

/** Every limit of the checks, with its source. A facility may tune them; a change never alters verdicts that stand. */
export const CHECK_THRESHOLDS = {
  scaleClassicalExcess: { value: 1.15, unit: '3rR', words: 'Most that C may reach over the classical 3rR', source: `Dulong and Petit, 3R per mole of atoms; 15 % of room for electrons and C_p − C_v: ${PRACTICE}`, range: [1, 2] },
  scaleLatticeAllowance: { value: 3, unit: '', words: 'How far C may stand above a Debye lattice that rises as steeply', source: PRACTICE, range: [1.5, 20] },
  scaleHandbookCaution: { value: 3, unit: '', words: 'Factor from the handbook curve that asks for caution', source: PRACTICE, range: [1.2, 10] },
  scaleHandbookFail: { value: 20, unit: '', words: 'Factor from the handbook curve that fails', source: PRACTICE, range: [3, 500] },
  electronicStandardErrors: { value: 3, unit: 'standard errors', words: 'How far γ of a metal must stand above zero, and γ of an insulator may', source: PRACTICE, range: [1, 10] },
  freeElectronLow: { value: 0.3, unit: '', words: 'Lowest ordinary γ/γ₀', source: 'spread of the handbook metals: C. Kittel, Introduction to Solid State Physics, ch. 6 (from memory)', range: [0.01, 1] },
  freeElectronHigh: { value: 5, unit: '', words: 'Highest ordinary γ/γ₀', source: 'spread of the handbook metals: C. Kittel, Introduction to Solid State Physics, ch. 6 (from memory)', range: [1, 100] },
  freeElectronAbsurd: { value: 2000, unit: '', words: 'γ/γ₀ beyond any heavy-electron metal', source: 'heavy-electron metals reach about 1000: G. R. Stewart, Rev. Mod. Phys. 56, 755 (1984) (from memory)', range: [100, 10_000] },
  handbookTolerance: { value: 0.05, unit: '', words: 'Share by which γ and Θ_D may miss the handbook range', source: 'rounding and spread of the handbook columns', range: [0.01, 0.3] },
  handbookCaution: { value: 0.15, unit: '', words: 'Share beyond the handbook range that fails', source: PRACTICE, range: [0.02, 1] },
  debyeLowK: { value: 30, unit: 'K', words: 'Lowest Θ_D of a solid', source: 'caesium, 38 K, is the softest element: C. Kittel, ch. 5 (from memory)', range: [5, 100] },
  debyeHighK: { value: 2300, unit: 'K', words: 'Highest Θ_D of a solid', source: 'diamond, 2230 K, is the stiffest: C. Kittel, ch. 5 (from memory)', range: [1000, 5000] },
  debyeDivisor: { value: 50, unit: '', words: 'Θ_D/T_max above which the T³ law holds', source: 'C. Kittel, ch. 5 (from memory); real phonon spectra leave T³ well before a Debye lattice does', range: [10, 100] },
  debyeDivisorBeta5: { value: 25, unit: '', words: 'The same with a β₅T⁵ term', source: PRACTICE, range: [5, 100] },
  debyeDivisorFail: { value: 10, unit: '', words: 'Θ_D/T_max below which the T³ law has no meaning', source: 'a pure Debye lattice is 4 to 5 % under T³ there (Debye function)', range: [2, 50] },
  constantStandardErrors: { value: 3, unit: 'standard errors', words: 'How far a constant added to the fit may stand from zero', source: PRACTICE, range: [1, 10] },
  constantStandardErrorsFail: { value: 5, unit: 'standard errors', words: 'The same, failing', source: PRACTICE, range: [2, 20] },
  negligibleShare: { value: 0.02, unit: '', words: 'Share of C at the cold end below which a significant term that should not be there asks for caution only', source: PRACTICE, range: [0, 0.2] },
  classicalShareCaution: { value: 0.1, unit: '', words: 'Highest ordinary share of the classical 3/2 R per mole of electrons', source: 'A. Sommerfeld, Z. Phys. 47, 1 (1928): the share is (π²/3) T/T_F', range: [0.001, 0.5] },
  transitionJump: { value: 0.08, unit: '', words: 'Share of C/T that makes a step a transition', source: PRACTICE, range: [0.01, 0.5] },
  transitionStandardErrors: { value: 6, unit: 'standard errors', words: 'How far a step must stand out of the noise', source: PRACTICE, range: [3, 20] },
  upturnRise: { value: 0.05, unit: '', words: 'Rise of C/T towards the cold end that counts as an upturn', source: PRACTICE, range: [0.01, 0.5] },
  upturnStandardErrors: { value: 5, unit: 'standard errors', words: 'How far the rise must stand out of the noise', source: PRACTICE, range: [2, 20] },
  upturnLeft: { value: 0.1, unit: '', words: 'Share of C at the cold end that a tail term may leave unexplained', source: PRACTICE, range: [0.01, 0.5] },
  residualsRunsP: { value: 0.01, unit: '', words: 'Probability of so few runs below which residuals are not random', source: 'A. Wald and J. Wolfowitz, Ann. Math. Stat. 11, 147 (1940); level: common practice', range: [0.0001, 0.1] },
  residualsChiCaution: { value: 2, unit: '', words: 'χ²/ν above which the stated errors are too small', source: PRACTICE, range: [1.1, 10] },
  residualsChiFail: { value: 10, unit: '', words: 'χ²/ν above which the model does not describe the points', source: PRACTICE, range: [2, 100] },
  residualsChiLow: { value: 0.2, unit: '', words: 'χ²/ν below which the stated errors are too large', source: PRACTICE, range: [0.01, 0.9] },
  residualsMisfit: { value: 0.1, unit: '', words: 'Mean misfit as a share of C that fails when the residuals are not random', source: PRACTICE, range: [0.01, 1] },
  coveragePoints: { value: 10, unit: 'points', words: 'Points that a window should hold', source: PRACTICE, range: [4, 200] },
  coverageFreedom: { value: 3, unit: '', words: 'Degrees of freedom below which errors mean little', source: PRACTICE, range: [1, 20] },
  coverageReach: { value: 0.5, unit: '', words: 'T_min/T_max that a window should reach down to', source: PRACTICE, range: [0.1, 0.9] },
  coverageReachFail: { value: 0.8, unit: '', words: 'T_min/T_max above which γ is a far extrapolation', source: PRACTICE, range: [0.2, 0.99] },
  coverageGap: { value: 0.4, unit: '', words: 'Widest gap between points, as a share of the window in T²', source: PRACTICE, range: [0.1, 0.9] },
  addendaCaution: { value: 0.5, unit: '', words: 'Share of the total that may be addenda', source: PRACTICE, range: [0.1, 0.9] },
  addendaFail: { value: 0.85, unit: '', words: 'Share of addenda above which the sample is lost in them', source: PRACTICE, range: [0.3, 0.99] },
  repeatCaution: { value: 0.02, unit: '', words: 'Spread of repeats, as a share of C', source: PRACTICE, range: [0.001, 0.2] },
  repeatFail: { value: 0.06, unit: '', words: 'The same, failing', source: PRACTICE, range: [0.005, 0.5] },
  massCaution: { value: 0.05, unit: '', words: 'Share by which mass, density and dimensions may disagree', source: PRACTICE, range: [0.005, 0.3] },
  massFail: { value: 0.2, unit: '', words: 'The same, failing', source: PRACTICE, range: [0.02, 1] },
  massUncertainty: { value: 0.02, unit: '', words: 'Relative uncertainty of the mass that asks for caution', source: PRACTICE, range: [0.001, 0.2] },
  standardAgeDays: { value: 180, unit: 'd', words: 'Age of the last copper reading', source: PRACTICE, range: [7, 1000] },
  standardDeviationPercent: { value: 2, unit: '%', words: 'Departure from the copper reference equation until a cryostat has a history of its own', source: PRACTICE, range: [0.2, 20] },
} as const satisfies Record<string, ThresholdRow>

/** Name of a limit. */
export type ThresholdId = keyof typeof CHECK_THRESHOLDS

/** The limits in force. */
export type Thresholds = Readonly<Record<ThresholdId, number>>

/**
 * The limits in force: the table, with what a facility has tuned. Unknown names, and values outside their range, are passed over.
 *
 * @param tuned values by name, only those that differ
 */
export function thresholdsWith(tuned: Readonly<Record<string, number>> = {}): Thresholds {
  return Object.fromEntries(Object.entries(CHECK_THRESHOLDS).map(([id, row]: [string, ThresholdRow]) => {
    const value = tuned[id]
    const [least, most] = row.range
    return [id, value !== undefined && value >= least && value <= most ? value : row.value]
  })) as Thresholds
}
