import { and, eq, isNull } from 'drizzle-orm'
import type { Actor } from '#shared/access/rules'
import { DomainError } from '#shared/errors'
import { deliveryEntry } from '#shared/helium/movements'
import { heliumMgFromLitres } from '#shared/units/helium-units'
import type { Database } from '#server/db/client'
import { heliumAccounts, heliumDeliveries } from '#server/db/schema'
import { authorise } from '#server/services/access/authorise'
import { writeAudit } from '#server/services/audit/write-audit'
import { findDewar } from './account-queries'
import { postHeliumEntry } from './post-entry'

/**
 * Books a delivery that has come, by what was counted at the door.
 *
 * @param db database
 * @param input which delivery, the litres that arrived, who took it, and the instant
 * @throws DomainError when it was booked already
 */
export async function receiveDelivery(db: Database, input: { deliveryId: string, litres: number, actor: Actor, now: Date }): Promise<void> {
  const { deliveryId, litres, actor, now } = input
  authorise(actor, 'helium:write')
  await db.transaction(async (tx) => {
    const [delivery] = await tx.select().from(heliumDeliveries).where(and(eq(heliumDeliveries.id, deliveryId), isNull(heliumDeliveries.receivedAt))).for('update')
    if (!delivery) throw new DomainError('conflict', 'This delivery was booked already. Reload to see the stock.')
    const [supplier] = await tx.select().from(heliumAccounts).where(eq(heliumAccounts.kind, 'supplier'))
    const dewar = await findDewar(tx, delivery.dewarAccountId)
    const entry = deliveryEntry({ supplier: { accountId: supplier!.id, kind: 'supplier', name: supplier!.name }, dewar, amountMg: heliumMgFromLitres(litres) })
    const movementId = await postHeliumEntry(tx, entry, { at: now, reason: `Delivery ${delivery.supplierReference}`, recordedBy: actor.personId })
    await tx.update(heliumDeliveries).set({ receivedAt: now, movementId }).where(eq(heliumDeliveries.id, deliveryId))
    await writeAudit(tx, { actorId: actor.personId, action: 'helium:receive', objectType: 'delivery', objectId: deliveryId, detail: { litres } })
  })
}
