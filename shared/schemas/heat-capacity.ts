import { z } from 'zod'
import { lineSchema, quantitySchema } from '#shared/schemas/common'
import { HEAT_CAPACITY_UNITS, TEMPERATURE_UNITS } from '#shared/units/heat-capacity-units'

const columnSchema = (label: string) => z.number({ required_error: `Choose the column of ${label}.`, invalid_type_error: `Choose the column of ${label}.` }).int().min(0).max(99)
const heatCapacityUnitSchema = z.enum(HEAT_CAPACITY_UNITS, { message: 'Choose the unit of the heat capacities.' })

/** Which columns of a table hold what, with their units. Columns count from 0. */
export const columnMappingSchema = z.object({
  temperature: z.object({ column: columnSchema('the temperatures'), unit: z.enum(TEMPERATURE_UNITS, { message: 'Choose the unit of the temperatures.' }) }).strict(),
  heatCapacity: z.object({ column: columnSchema('the heat capacities'), unit: heatCapacityUnitSchema }).strict(),
  sigma: z.object({ column: columnSchema('the uncertainties'), unit: z.union([z.literal('%'), heatCapacityUnitSchema]) }).strict().optional(),
}).strict().superRefine((mapping, context) => {
  const columns = [mapping.temperature.column, mapping.heatCapacity.column, ...(mapping.sigma ? [mapping.sigma.column] : [])]
  if (new Set(columns).size !== columns.length) context.addIssue({ code: 'custom', path: ['heatCapacity', 'column'], message: 'A column is chosen twice. Choose another for one of them.' })
})
export type ColumnMapping = z.infer<typeof columnMappingSchema>

/** Sample facts of an analysis; molar mass and atoms per formula unit follow from the formula. */
export const analysisSampleSchema = z.object({
  formula: lineSchema('a chemical formula such as Cu or Al2O3', 120),
  kind: z.enum(['metal', 'superconductor', 'insulator', 'unknown'], { message: 'Choose what kind of material it is.' }),
  massMg: quantitySchema('a mass', 'mg', { above: 0, most: 1e6 }).optional(),
  massUncertaintyMg: quantitySchema('an uncertainty of the mass', 'mg', { least: 0, most: 1e5 }).optional(),
  densityGPerCm3: quantitySchema('a density', 'g/cm³', { above: 0, most: 30 }).optional(),
  volumeMm3: quantitySchema('a volume', 'mm³', { above: 0, most: 1e6 }).optional(),
  conductionElectrons: quantitySchema('conduction electrons per formula unit', '', { above: 0, most: 100 }).optional(),
  criticalTemperatureK: quantitySchema('a critical temperature', 'K', { above: 0, most: 300 }).optional(),
}).strict()
export type AnalysisSampleInput = z.infer<typeof analysisSampleSchema>

/** Terms of the model, in the spelling of the command line: γT, β₃T³, β₅T⁵, A/T². */
export const MODEL_TERMS = ['gamma', 'beta3', 'beta5', 'tail'] as const

/** Terms and window of a fit. */
export const fitModelSchema = z.object({
  terms: z.array(z.enum(MODEL_TERMS, { message: 'A term is one of gamma, beta3, beta5 and tail.' })).min(1, 'Choose at least one term.').max(4)
    .refine(terms => new Set(terms).size === terms.length, 'A term stands twice in the model. Name each term once.'),
  windowK: z.tuple([quantitySchema('the lower end of the window', 'K', { least: 0, most: 2000 }), quantitySchema('the upper end of the window', 'K', { above: 0, most: 2000 })])
    .refine(([low, high]) => low < high, 'The window must run from a lower to a higher temperature.'),
}).strict()
export type FitModelInput = z.infer<typeof fitModelSchema>

/** A table as text, with its mapping where the heads do not say it. */
const tableInputSchema = z.object({
  text: z.string({ required_error: 'Send the table as text.' }).min(1, 'The table is empty.').max(50 * 1024 * 1024, 'The table is larger than 50 MB. Cut it into parts.'),
  mapping: columnMappingSchema.optional(),
}).strict()

/** Body of `POST /api/heat-capacity/check`: nothing of it is stored. */
export const heatCapacityCheckSchema = z.object({
  table: tableInputSchema,
  sample: analysisSampleSchema,
  /** Left out: γT + β₃T³ over the window that the advice chooses. */
  model: z.object({ terms: fitModelSchema.shape.terms.optional(), windowK: fitModelSchema.shape.windowK.optional() }).strict().optional(),
  addenda: tableInputSchema.optional(),
  /** Lines of the file that were left out and are to be put back. */
  restoredRows: z.array(z.number().int().positive()).max(10_000).optional(),
}).strict()
export type HeatCapacityCheckInput = z.infer<typeof heatCapacityCheckSchema>
