/** Standard deviations from the middle to the ends of an interval that holds 80 % of a normal distribution: Φ⁻¹(0.9). */
export const EIGHTY_PERCENT_Z = 1.2815515655446004
