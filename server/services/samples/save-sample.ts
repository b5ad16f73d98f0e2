import { eq } from 'drizzle-orm'
import type { Actor } from '#shared/access/rules'
import { DomainError } from '#shared/errors'
import { parseFormula } from '#shared/heat-capacity/sample'
import type { SampleInput } from '#shared/schemas/sample'
import type { Database } from '#server/db/client'
import { samples } from '#server/db/schema'
import { authorise } from '#server/services/access/authorise'
import { writeAudit } from '#server/services/audit/write-audit'

/**
 * Saves a sample sheet; molar mass and atoms per formula unit come from the formula. Saved analyses keep the facts they
 * were made with.
 *
 * @param db database
 * @param input the sheet as typed, which sample (none for a new one), and who saves it
 * @returns id of the sample
 * @throws DomainError naming the field, first of all a formula that cannot be read
 */
export async function saveSample(db: Database, input: { sheet: SampleInput, sampleId?: string, actor: Actor }): Promise<string> {
  const { sheet, sampleId, actor } = input
  authorise(actor, 'sample:write', { groupId: sheet.groupId })
  const { molarMassGPerMol, atomsPerFormulaUnit } = parseFormula(sheet.formula)
  return db.transaction(async (tx) => {
    const values = { ...sheet, molarMassGPerMol, atomsPerFormulaUnit }
    let id = sampleId
    if (id) {
      const [before] = await tx.select({ groupId: samples.groupId }).from(samples).where(eq(samples.id, id))
      if (!before) throw new DomainError('not-found', 'There is no such sample. Look for it under Samples.')
      authorise(actor, 'sample:write', { groupId: before.groupId })
      if (before.groupId !== sheet.groupId) throw new DomainError('invalid', 'A sample stays with its group. Make a new sheet for the other group.', ['groupId'])
      await tx.update(samples).set(values).where(eq(samples.id, id))
    }
    else {
      const [row] = await tx.insert(samples).values({ ...values, createdBy: actor.personId }).returning({ id: samples.id })
      id = row!.id
    }
    await writeAudit(tx, { actorId: actor.personId, action: 'sample:write', objectType: 'sample', objectId: id, detail: { formula: sheet.formula } })
    return id
  })
}
