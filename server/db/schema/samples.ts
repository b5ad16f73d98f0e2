import { sql } from 'drizzle-orm'
import { check, doublePrecision, index, pgTable, text, uuid } from 'drizzle-orm/pg-core'
import { createdAt, id } from '../columns'
import { groups, people } from './people'
import type { MaterialKind } from '#shared/heat-capacity/types'

/** A sample of a group. Molar mass and atoms per formula unit are computed from the formula when it is saved. */
export const samples = pgTable('samples', {
  id: id(),
  groupId: uuid('group_id').notNull().references(() => groups.id),
  createdBy: uuid('created_by').notNull().references(() => people.id),
  name: text('name').notNull(),
  formula: text('formula').notNull(),
  kind: text('kind').$type<MaterialKind>().notNull(),
  molarMassGPerMol: doublePrecision('molar_mass_g_per_mol').notNull(),
  atomsPerFormulaUnit: doublePrecision('atoms_per_formula_unit').notNull(),
  massMg: doublePrecision('mass_mg'),
  massUncertaintyMg: doublePrecision('mass_uncertainty_mg'),
  densityGPerCm3: doublePrecision('density_g_per_cm3'),
  conductionElectrons: doublePrecision('conduction_electrons'),
  criticalTemperatureK: doublePrecision('critical_temperature_k'),
  hazards: text('hazards').notNull().default(''),
  createdAt: createdAt(),
}, table => [
  index('samples_group').on(table.groupId),
  check('samples_kind', sql`${table.kind} in ('metal', 'superconductor', 'insulator', 'unknown')`),
  check('samples_mass', sql`(${table.massMg} is null or ${table.massMg} > 0) and (${table.massUncertaintyMg} is null or ${table.massUncertaintyMg} >= 0)`),
])
