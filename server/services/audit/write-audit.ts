import type { Database } from '#server/db/client'
import { auditEvents } from '#server/db/schema'

/** What is written of an action: never a password, token, card or link. */
export interface AuditEntry {
  actorId: string | null
  action: string
  objectType: string
  objectId?: string
  requestId?: string
  detail?: Record<string, unknown>
}

/**
 * Writes one audit row; rows are never changed or deleted (trigger).
 *
 * @param db database or transaction; the transaction of the action itself, so that both stand or fall together
 * @param entry who did what to which object
 */
export async function writeAudit(db: Database, entry: AuditEntry): Promise<void> {
  await db.insert(auditEvents).values({ ...entry, detail: entry.detail ?? {} })
}
