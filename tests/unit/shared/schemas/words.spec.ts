import { describe, expect, it } from 'vitest'
import { z } from 'zod'

const modules = import.meta.glob<Record<string, unknown>>('../../../../shared/schemas/*.ts', { eager: true })
const schemas = Object.entries(modules).flatMap(([file, exported]) => Object.entries(exported)
  .filter((entry): entry is [string, z.ZodTypeAny] => entry[1] instanceof z.ZodType)
  .map(([name, schema]) => [`${file.split('/').at(-1)!} ${name}`, schema] as const))

/** The object inside refinements and transforms, if there is one. */
function objectsIn(schema: z.ZodTypeAny): z.AnyZodObject[] {
  if (schema instanceof z.ZodObject) return [schema]
  if (schema instanceof z.ZodEffects) return objectsIn(schema.innerType())
  if (schema instanceof z.ZodPipeline) return objectsIn(schema._def.in as z.ZodTypeAny)
  if (schema instanceof z.ZodDiscriminatedUnion) return schema.options.flatMap(objectsIn)
  return []
}

const wrong = [undefined, null, Number.NaN, -1, 1e12, 'x', '', 'x'.repeat(10_000), [], ['x'], {}, true, '2027-02-30', '25:00']

function refusalsOf(schema: z.ZodTypeAny): string[] {
  const kinds = objectsIn(schema).map(({ shape }) => shape.kind instanceof z.ZodLiteral ? { kind: shape.kind.value as unknown } : {})
  const fields = [...new Set(objectsIn(schema).flatMap(({ shape }) => Object.keys(shape)))]
  const inputs = [...wrong, ...kinds.flatMap(base => [base, { ...base, stray: 1 }, ...fields.flatMap(field => wrong.map(value => ({ ...base, [field]: value })))])]
  return [...new Set(inputs.flatMap(input => schema.safeParse(input).error?.issues.map(issue => issue.message) ?? []))]
}

describe('what a form says of bad input', () => {
  it('is asked of every schema', () => {
    expect(schemas.length).toBeGreaterThan(30)
  })

  it.each(schemas)('%s refuses in full sentences that say what to do', (_, schema) => {
    const refusals = refusalsOf(schema)
    expect(refusals).not.toEqual([])
    for (const refusal of refusals) {
      expect(refusal).toMatch(/^[A-Z“].* .*\.$/)
      expect(refusal).not.toMatch(/^(Required|Invalid|Expected|Unrecognized|String must|Number must|Array must|Input not)/)
      expect(refusal).toMatch(/\b(Enter|Choose|Give|Fill|Leave|Go back|Check|Correct|Reload|Say|Send|Sign|Name|Cut|Write|Keep|Search|must run|is one of|There is no such)\b/)
    }
  })

  it.each(schemas.filter(([, schema]) => objectsIn(schema).length > 0))('%s refuses a field it does not know', (_, schema) => {
    for (const object of objectsIn(schema)) expect(object._def.unknownKeys).toBe('strict')
  })
})
