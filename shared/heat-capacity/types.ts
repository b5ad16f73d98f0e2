/** What kind of material a sample is said to be; decides which checks apply. */
export type MaterialKind = 'metal' | 'superconductor' | 'insulator' | 'unknown'

/** A heat-capacity curve in the engine's own units, sorted by rising temperature. All arrays have the same length. */
export interface HeatCapacityCurve {
  /** Sample temperature, K. */
  readonly temperatureK: readonly number[]
  /** Heat capacity per mole of formula units, mJ/(mol K). */
  readonly heatCapacity: readonly number[]
  /** Standard uncertainty of each heat capacity, mJ/(mol K); undefined when the file states none. */
  readonly sigma?: readonly number[]
  /** Line of the file that each point came from, from 1; tells up from down sweeps. Absent for computed curves. */
  readonly rowNumbers?: readonly number[]
}

/** The sample facts that the fit and the checks need. */
export interface HeatCapacitySample {
  /** Chemical formula as typed, e.g. `Cu` or `Al2O3`. */
  readonly formula: string
  readonly molarMassGPerMol: number
  /** Atoms per formula unit, r. */
  readonly atomsPerFormulaUnit: number
  readonly kind: MaterialKind
  /** Conduction electrons per formula unit, where known. */
  readonly conductionElectrons?: number
  /** Critical temperature of a superconductor, K. */
  readonly criticalTemperatureK?: number
  readonly massMg?: number
  readonly massUncertaintyMg?: number
  readonly densityGPerCm3?: number
  /** Volume from the sample's dimensions, mm³. */
  readonly volumeMm3?: number
}

/** Terms a low-temperature fit may hold: γT, β₃T³, β₅T⁵, A/T², and a constant (used by the zero-at-zero check only). */
export type FitTerm = 'gamma' | 'beta3' | 'beta5' | 'tail' | 'constant'

/** Which terms to fit and over which temperatures. */
export interface FitModel {
  readonly terms: readonly FitTerm[]
  /** Lowest and highest temperature used, K, both included. */
  readonly windowK: readonly [number, number]
}

/** A fitted number with its standard error and unit. */
export interface Estimate {
  readonly value: number
  readonly standardError: number
  readonly unit: string
}

/** How the points were weighted and which convention the standard errors follow. */
export type FitWeights = 'stated-sigma' | 'relative' | 'uniform'

/** Result of the weighted linear fit. */
export interface LowTemperatureFit {
  readonly model: FitModel
  readonly weights: FitWeights
  /** Standard errors: `absolute` takes σ at face value, `scaled` multiplies by √(χ²/ν). */
  readonly errorConvention: 'absolute' | 'scaled'
  readonly coefficients: Readonly<Partial<Record<FitTerm, Estimate>>>
  /** Covariance of the coefficients in the order of `model.terms`. */
  readonly covariance: readonly (readonly number[])[]
  /** Θ_D in K, absent when β₃ ≤ 0. */
  readonly debyeTemperature?: Estimate
  readonly pointCount: number
  readonly degreesOfFreedom: number
  readonly chiSquared: number
  readonly reducedChiSquared: number
  readonly conditionNumber: number
  /** Corrected Akaike criterion; absent when too few points. */
  readonly aicc?: number
  /** Weighted residuals (data − fit)/σ of the points inside the window, in order. */
  readonly residuals: readonly number[]
  /** Indices into the curve of the points used. */
  readonly usedIndices: readonly number[]
  /** With `relative` weights, the share of C that was taken as σ, e.g. 0.01. */
  readonly relativeSigma?: number
  /** Relative uncertainty common to all points (the mass), already inside the standard errors and the covariance; absent when none was added. */
  readonly commonRelativeUncertainty?: number
}

export type CheckStatus = 'ok' | 'caution' | 'fail' | 'not-applicable'

export type CheckId
  = | 'scale' | 'electronic-term' | 'free-electron' | 'handbook' | 'debye-range' | 'zero-at-zero' | 'classical-share'
    | 'transition' | 'upturn' | 'residuals' | 'coverage' | 'addenda' | 'repeat' | 'mass' | 'standard'

/** One thing a result must obey, with its number, the accepted band and where the band comes from. */
export interface CheckResult {
  readonly id: CheckId
  readonly status: CheckStatus
  /** Short title in plain words, e.g. `Electronic term is there`. */
  readonly title: string
  /** One plain sentence. */
  readonly message: string
  /** The number judged, in `unit`; absent when not applicable. */
  readonly value?: number
  readonly unit?: string
  /** Accepted band, low and high (either may be null for open). */
  readonly band?: readonly [number | null, number | null]
  /** Where the band comes from. */
  readonly source: string
  /** Two lines on why this matters. */
  readonly why: string
}

/** A single conversion that would bring scale, handbook and debye-range into band. */
export interface CorrectionSuggestion {
  readonly id: 'divide-by-1000' | 'multiply-by-1000' | 'per-gram-to-per-mole' | 'per-mole-to-per-gram' | 'per-atom-to-per-formula-unit' | 'per-formula-unit-to-per-atom' | 'calorie-to-joule' | 'mass-unit-milligram-gram' | 'addenda-forgotten'
  /** Multiply every heat capacity by it; 1 where no conversion can mend it. */
  readonly factor: number
  readonly message: string
}

export type Verdict = 'ok' | 'caution' | 'fail'

/** Everything one run of the engine says of a curve: what is stored as an analysis, shown, and printed as JSON. */
export interface HeatCapacityAnalysis {
  readonly engineVersion: string
  readonly fit: LowTemperatureFit
  readonly checks: readonly CheckResult[]
  readonly verdict: Verdict
  readonly suggestions: readonly CorrectionSuggestion[]
}
