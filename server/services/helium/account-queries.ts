import { eq, or, sql } from 'drizzle-orm'
import type { HeliumAccount } from '#shared/helium/entries'
import { DomainError } from '#shared/errors'
import type { Database } from '#server/db/client'
import { heliumAccounts, heliumPostings } from '#server/db/schema'

/** The accounts a cryostat's helium comes from and goes to. */
export interface CryostatAccounts { cryostat: HeliumAccount, recovery: HeliumAccount, lost: HeliumAccount }

const toAccount = (row: { id: string, kind: HeliumAccount['kind'], name: string }): HeliumAccount => ({ accountId: row.id, kind: row.kind, name: row.name })

/**
 * The account of a cryostat with recovery and lost.
 *
 * @param tx transaction
 * @param cryostatId the cryostat
 * @throws DomainError `not-found` for a cryostat that holds no liquid
 */
export async function findCryostatAccounts(tx: Database, cryostatId: string): Promise<CryostatAccounts> {
  const rows = await tx.select().from(heliumAccounts).where(or(eq(heliumAccounts.cryostatId, cryostatId), eq(heliumAccounts.kind, 'recovery'), eq(heliumAccounts.kind, 'lost')))
  const of = (kind: HeliumAccount['kind']) => rows.find(row => row.kind === kind)
  const [cryostat, recovery, lost] = [of('cryostat'), of('recovery'), of('lost')]
  if (!cryostat || !recovery || !lost) throw new DomainError('not-found', 'This cryostat holds no liquid helium, so levels and transfers do not apply to it.')
  return { cryostat: toAccount(cryostat), recovery: toAccount(recovery), lost: toAccount(lost) }
}

/** Every account with what the books say it holds, mg. */
export async function readHeliumBalances(db: Database) {
  return db.select({
    id: heliumAccounts.id,
    kind: heliumAccounts.kind,
    name: heliumAccounts.name,
    capacityLitres: heliumAccounts.capacityLitres,
    balanceMg: sql<number>`coalesce(sum(${heliumPostings.amountMg}), 0)::float8`,
  }).from(heliumAccounts).leftJoin(heliumPostings, eq(heliumPostings.accountId, heliumAccounts.id))
    .groupBy(heliumAccounts.id).orderBy(heliumAccounts.kind, heliumAccounts.name)
}

/**
 * Finds a storage dewar with its balance.
 *
 * @param tx transaction
 * @param accountId as chosen on the form
 * @throws DomainError when there is no such dewar
 */
export async function findDewar(tx: Database, accountId: string): Promise<HeliumAccount & { balanceMg: number }> {
  const row = (await readHeliumBalances(tx)).find(account => account.id === accountId && account.kind === 'dewar')
  if (!row) throw new DomainError('invalid', 'There is no such dewar. Choose one from the list.', ['fromAccountId'])
  return { ...toAccount(row), balanceMg: row.balanceMg }
}
