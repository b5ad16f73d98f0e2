import { describe, expect, it } from 'vitest'
import { columnMappingSchema, fitModelSchema, heatCapacityCheckSchema } from '#shared/schemas/heat-capacity'

const mapping = { temperature: { column: 0, unit: 'K' }, heatCapacity: { column: 1, unit: 'mJ/(mol K)' } }
const firstIssue = (result: { success: boolean, error?: { issues: { message: string, path: (string | number)[] }[] } }) => result.error?.issues[0]

describe('heat-capacity schemas', () => {
  it('take a complete mapping, with σ in per cent or a unit', () => {
    expect(columnMappingSchema.safeParse(mapping).success).toBe(true)
    expect(columnMappingSchema.safeParse({ ...mapping, sigma: { column: 2, unit: '%' } }).success).toBe(true)
    expect(columnMappingSchema.safeParse({ ...mapping, sigma: { column: 2, unit: 'µJ/K' } }).success).toBe(true)
  })

  it('name the field and the remedy', () => {
    expect(firstIssue(columnMappingSchema.safeParse({ ...mapping, heatCapacity: { column: 0, unit: 'J/K' } }))).toMatchObject({ path: ['heatCapacity', 'column'], message: expect.stringContaining('chosen twice') })
    expect(firstIssue(columnMappingSchema.safeParse({ ...mapping, heatCapacity: { column: 1, unit: 'J' } }))).toMatchObject({ path: ['heatCapacity', 'unit'], message: 'Choose the unit of the heat capacities.' })
    expect(firstIssue(fitModelSchema.safeParse({ terms: ['gamma', 'gamma'], windowK: [1, 2] }))?.message).toMatch(/stands twice/)
    expect(firstIssue(fitModelSchema.safeParse({ terms: ['gamma'], windowK: [7, 2] }))?.message).toMatch(/lower to a higher/)
    expect(firstIssue(fitModelSchema.safeParse({ terms: ['gamma', 'constant'], windowK: [1, 2] }))?.message).toMatch(/gamma, beta3, beta5 and tail/)
  })

  it('refuse what they do not know', () => {
    const body = { table: { text: 'T/K,C/(J/(mol K))\n1,2\n' }, sample: { formula: 'Cu', kind: 'metal' } }
    expect(heatCapacityCheckSchema.safeParse(body).success).toBe(true)
    expect(heatCapacityCheckSchema.safeParse({ ...body, store: true }).success).toBe(false)
    expect(firstIssue(heatCapacityCheckSchema.safeParse({ ...body, sample: { ...body.sample, massMg: -1 } }))?.message).toMatch(/mass above 0 and up to 1000000 mg/)
    expect(firstIssue(heatCapacityCheckSchema.safeParse({ ...body, table: { text: '' } }))?.message).toBe('The table is empty.')
  })
})
