import { eq } from 'drizzle-orm'
import type { Actor } from '#shared/access/rules'
import { DomainError } from '#shared/errors'
import type { Database } from '#server/db/client'
import { closures } from '#server/db/schema'
import { authorise } from '#server/services/access/authorise'
import { writeAudit } from '#server/services/audit/write-audit'

/**
 * Opens a cryostat again. A closure still to come is taken back; one under way ends now, so that what was stays on the board.
 *
 * @param db database
 * @param input the closure, who opens it again, and the instant
 * @throws DomainError `not-found` when there is no such closure, `conflict` when it is over
 */
export async function deleteClosure(db: Database, { closureId, actor, now }: { closureId: string, actor: Actor, now: Date }): Promise<void> {
  await db.transaction(async (tx) => {
    authorise(actor, 'closure:write')
    const [closure] = await tx.select().from(closures).where(eq(closures.id, closureId)).for('update')
    if (!closure) throw new DomainError('not-found', 'There is no such closure any more. Reload the board.')
    const { startsAt, endsAt } = closure.during
    if (endsAt <= now) throw new DomainError('conflict', 'This closure is over, so it stays as it was.')
    if (startsAt < now) await tx.update(closures).set({ during: { startsAt, endsAt: now } }).where(eq(closures.id, closureId))
    else await tx.delete(closures).where(eq(closures.id, closureId))
    await writeAudit(tx, { actorId: actor.personId, action: 'closure:write', objectType: 'closure', objectId: closureId, detail: { opened: startsAt < now ? 'early' : 'before it began' } })
  })
}
