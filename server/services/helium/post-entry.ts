import { checkBalanced, type HeliumEntry } from '#shared/helium/entries'
import type { Database } from '#server/db/client'
import { heliumMovements, heliumPostings } from '#server/db/schema'

/** Where and when a movement happened. */
export interface MovementFacts {
  at: Date
  reason: string
  runId?: string
  entryId?: string
  recordedBy?: string
}

/**
 * Writes a balanced movement with its postings.
 *
 * @param tx the transaction of what caused it; the database checks the balance again when it commits
 * @param entry balanced postings in milligrams
 * @param facts when, why, and for which run and run-sheet line
 * @returns id of the movement
 */
export async function postHeliumEntry(tx: Database, entry: HeliumEntry, facts: MovementFacts): Promise<string> {
  const postings = checkBalanced(entry.postings)
  const [movement] = await tx.insert(heliumMovements).values(facts).returning({ id: heliumMovements.id })
  await tx.insert(heliumPostings).values(postings.map(posting => ({ ...posting, movementId: movement!.id })))
  return movement!.id
}
