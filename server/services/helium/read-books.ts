import { asc, desc, eq, inArray, isNull } from 'drizzle-orm'
import type { HeliumBooksReply } from '#shared/types/facility'
import { heliumLitresFromMg } from '#shared/units/helium-units'
import type { Database } from '#server/db/client'
import { heliumAccounts, heliumDeliveries, heliumMovements, heliumPostings, runs } from '#server/db/schema'
import { readFacility } from '#server/services/facility/queries'
import { readHeliumBalances } from './account-queries'

const NEWEST = 60

/** The books of helium: what each account holds, the newest movements, what is ordered. */
export async function readHeliumBooks(db: Database): Promise<HeliumBooksReply> {
  const { timeZone } = await readFacility(db)
  const accounts = await readHeliumBalances(db)
  const movements = await db.select({ id: heliumMovements.id, at: heliumMovements.at, reason: heliumMovements.reason, runId: heliumMovements.runId, runNumber: runs.number })
    .from(heliumMovements).leftJoin(runs, eq(runs.id, heliumMovements.runId)).orderBy(desc(heliumMovements.at), desc(heliumMovements.id)).limit(NEWEST)
  const postings = movements.length > 0
    ? await db.select({ movementId: heliumPostings.movementId, account: heliumAccounts.name, amountMg: heliumPostings.amountMg }).from(heliumPostings)
        .innerJoin(heliumAccounts, eq(heliumAccounts.id, heliumPostings.accountId)).where(inArray(heliumPostings.movementId, movements.map(movement => movement.id))).orderBy(asc(heliumPostings.amountMg))
    : []
  const deliveries = await db.select({ id: heliumDeliveries.id, dueAt: heliumDeliveries.dueAt, litres: heliumDeliveries.litres, dewar: heliumAccounts.name, supplierReference: heliumDeliveries.supplierReference })
    .from(heliumDeliveries).innerJoin(heliumAccounts, eq(heliumAccounts.id, heliumDeliveries.dewarAccountId)).where(isNull(heliumDeliveries.receivedAt)).orderBy(heliumDeliveries.dueAt)
  return {
    timeZone,
    accounts: accounts.map(({ balanceMg, ...account }) => ({ ...account, litres: heliumLitresFromMg(balanceMg) })),
    movements: movements.map(movement => ({
      ...movement, at: movement.at.toISOString(),
      postings: postings.filter(posting => posting.movementId === movement.id).map(({ account, amountMg }) => ({ account, litres: heliumLitresFromMg(amountMg) })),
    })),
    deliveries: deliveries.map(delivery => ({ ...delivery, dueAt: delivery.dueAt.toISOString() })),
  }
}
