import type { Actor } from '#shared/access/rules'
import { heliumMgFromLitres } from '#shared/units/helium-units'
import type { Database } from '#server/db/client'
import { facilities, heliumAccounts, heliumMovements, heliumPostings } from '#server/db/schema'
import type { TestFacility } from './rows'

/** The facility's own row: Oslo, a reserve of 80 L. */
export async function insertFacilityRow(db: Database, timeZone = 'Europe/Oslo') {
  await db.insert(facilities).values({
    name: 'Skerry Low-Temperature Facility', timeZone, currency: 'EUR', addressLines: ['Quay House 3'], email: 'desk@skerry.example', vatId: 'NO 999', bankAccount: 'NO00',
    reserveLitres: 80, payByHours: 72, quoteLockDays: 14, paymentTermDays: 30, refundLadder: [],
  })
}

/** Supplier, one dewar and the lost account. */
export async function insertStockAccounts(db: Database) {
  const rows = await db.insert(heliumAccounts).values([{ kind: 'supplier', name: 'Supplier' }, { kind: 'dewar', name: 'Dewar D-07' }, { kind: 'lost', name: 'Lost' }]).returning()
  const of = (kind: string) => rows.find(row => row.kind === kind)!.id
  return { supplier: of('supplier'), dewar: of('dewar'), lost: of('lost') }
}

/** Moves litres from one account to another. */
export async function moveHelium(db: Database, from: string, to: string, litres: number, at: string) {
  await db.transaction(async (tx) => {
    const [movement] = await tx.insert(heliumMovements).values({ at: new Date(at), reason: 'test' }).returning()
    const amountMg = heliumMgFromLitres(litres)
    await tx.insert(heliumPostings).values([{ movementId: movement!.id, accountId: from, amountMg: -amountMg }, { movementId: movement!.id, accountId: to, amountMg }])
  })
}

/** Somebody of the facility's staff. */
export const actorOf = (role: 'manager' | 'operator', personId = '00000000-0000-7000-8000-000000000001'): Actor => ({ personId, isManager: role === 'manager', isOperator: role === 'operator', memberships: [] })

/** The person of a test facility: PI of its group. */
export const piOf = (facility: TestFacility): Actor => ({ personId: facility.personId, isManager: false, isOperator: false, memberships: [{ groupId: facility.groupId, role: 'pi' }] })
