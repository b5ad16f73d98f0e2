/** Molar gas constant, J/(mol K), exact since the 2019 SI (CODATA 2018). */
const GAS_CONSTANT_J_PER_MOL_K = 8.314462618

/** Steps of Simpson's rule; the integrand is smooth and this gives better than 1e-9 over the whole range. */
const STEPS = 200

/** x⁴eˣ/(eˣ − 1)², written with expm1 so that it neither cancels near zero nor overflows far out. */
function integrand(x: number): number {
  if (x === 0) return 0
  const denominator = -Math.expm1(-x)
  return x ** 4 * Math.exp(-x) / (denominator * denominator)
}

/**
 * Debye heat capacity of a lattice, used to plan (what a sample or a cold mass will take up), not to judge results.
 *
 * @param temperatureK Temperature, K, zero or more.
 * @param debyeTemperatureK Debye temperature Θ_D, K, above zero.
 * @returns Heat capacity per mole of atoms, J/(mol K); 3R when warm, (12π⁴/5)R(T/Θ)³ when cold.
 * Source: P. Debye, Ann. Phys. 344, 789 (1912); any text on solid-state physics.
 */
export function debyeHeatCapacityJPerMolK(temperatureK: number, debyeTemperatureK: number): number {
  if (temperatureK <= 0) return 0
  const t = temperatureK / debyeTemperatureK
  // Beyond x = 60 the integrand is below 1e-19 of the whole, and the T³ law is exact to double precision.
  if (t < 1 / 60) return 12 * Math.PI ** 4 / 5 * GAS_CONSTANT_J_PER_MOL_K * t ** 3
  const h = 1 / t / STEPS
  let sum = integrand(1 / t)
  for (let i = 1; i < STEPS; i++) sum += integrand(i * h) * (i % 2 === 1 ? 4 : 2)
  return 9 * GAS_CONSTANT_J_PER_MOL_K * t ** 3 * sum * h / 3
}
