import { HELIUM_LIQUID_DENSITY_KG_PER_M3 } from '#shared/helium/properties'

/** Milligrams of helium in a litre of liquid at 4.2 K and 101.325 kPa. */
export const HELIUM_MG_PER_LITRE = HELIUM_LIQUID_DENSITY_KG_PER_M3 * 1000

/** Milliseconds in an hour. */
export const MS_PER_HOUR = 3_600_000

/**
 * Mass of a volume of liquid helium.
 *
 * @param litres Litres of liquid at 4.2 K and 101.325 kPa.
 * @returns Mass, whole milligrams.
 */
export function heliumMgFromLitres(litres: number): number {
  return Math.round(litres * HELIUM_MG_PER_LITRE)
}

/**
 * Volume that a mass of helium has as liquid.
 *
 * @param amountMg Mass, mg.
 * @returns Litres of liquid at 4.2 K and 101.325 kPa.
 */
export function heliumLitresFromMg(amountMg: number): number {
  return amountMg / HELIUM_MG_PER_LITRE
}

/**
 * Mass in grams, as the books store it.
 *
 * @param amountMg Mass, mg.
 * @returns Mass, g.
 */
export function heliumGFromMg(amountMg: number): number {
  return amountMg / 1000
}

/**
 * Mass in whole milligrams from grams.
 *
 * @param heliumG Mass, g.
 * @returns Mass, whole milligrams.
 */
export function heliumMgFromG(heliumG: number): number {
  return Math.round(heliumG * 1000)
}

/**
 * Litres for a sentence: `12.4 L` with a thin space and the proper minus.
 *
 * @param litres Litres of liquid.
 * @param digits Digits after the point; left out, one below 100 L and none from there on.
 * @returns Text with its unit.
 */
export function litresText(litres: number, digits = Math.abs(litres) < 99.95 ? 1 : 0): string {
  const rounded = Math.abs(litres).toFixed(digits)
  const sign = litres < 0 && Number(rounded) !== 0 ? '−' : ''
  return `${sign}${rounded}\u2009L`
}
