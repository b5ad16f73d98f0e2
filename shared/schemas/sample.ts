import { z } from 'zod'
import { idSchema, lineSchema, quantitySchema, textSchema } from '#shared/schemas/common'

/** Kinds of material, with the words of the form. */
export const MATERIAL_KIND_WORDS = { metal: 'metal', superconductor: 'superconductor', insulator: 'insulator or semiconductor', unknown: 'not known' } as const

/** A sample sheet; molar mass and atoms per formula unit are computed from the formula. */
export const sampleSchema = z.object({
  groupId: idSchema,
  name: lineSchema('a name', 80),
  formula: lineSchema('a chemical formula such as Cu or Al2O3', 120),
  kind: z.enum(['metal', 'superconductor', 'insulator', 'unknown'], { message: 'Choose what kind of material it is.' }),
  massMg: quantitySchema('a mass', 'mg', { above: 0, most: 1e6 }).nullish(),
  massUncertaintyMg: quantitySchema('an uncertainty of the mass', 'mg', { least: 0, most: 1e5 }).nullish(),
  densityGPerCm3: quantitySchema('a density', 'g/cm³', { above: 0, most: 30 }).nullish(),
  conductionElectrons: quantitySchema('conduction electrons per formula unit', '', { above: 0, most: 100 }).nullish(),
  criticalTemperatureK: quantitySchema('a critical temperature', 'K', { above: 0, most: 300 }).nullish(),
  hazards: textSchema(500).default(''),
}).strict()

export const sampleParams = z.object({ sampleId: idSchema }).strict()

export type SampleInput = z.output<typeof sampleSchema>
