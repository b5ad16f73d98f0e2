import { v7 as uuidv7 } from 'uuid'
import type { HeliumAccount, HeliumEntry } from '#shared/helium/entries'
import { boilOffEntry, deliveryEntry, liquefactionEntry, transferEntry } from '#shared/helium/movements'
import { heliumMgFromLitres } from '#shared/units/helium-units'
import type { Database } from '#server/db/client'
import { type cryostats, heliumDeliveries, heliumMovements, heliumPostings, type runEntries } from '#server/db/schema'
import type { SeededFacility } from './facility'

type Entry = typeof runEntries.$inferSelect
type Cryostat = typeof cryostats.$inferSelect

const DELIVERY_LITRES = 230
const FULL_DEWAR_LITRES = 245
const BATCH = 1000

/** Keeps the books of the seeded runs in order of time, with deliveries as the dewars empty. */
export class HeliumBooks {
  private readonly movements: (typeof heliumMovements.$inferInsert & { id: string })[] = []
  private readonly postings: (typeof heliumPostings.$inferInsert)[] = []
  private readonly deliveries: (typeof heliumDeliveries.$inferInsert)[] = []
  private readonly balanceMg = new Map<string, number>()

  constructor(private readonly facility: SeededFacility) {}

  /** Books the lines of all run sheets, oldest first. */
  bookEntries(lines: { entry: Entry, cryostat: Cryostat }[]) {
    for (const { entry, cryostat } of [...lines].sort((a, b) => a.entry.at.getTime() - b.entry.at.getTime())) {
      if (entry.liquidLitres === null) continue
      const vessel = this.account(this.facility.accounts.cryostat.get(cryostat.id)!, 'cryostat', cryostat.name)
      if (entry.kind === 'transfer') this.bookTransfer(entry, cryostat, vessel)
      else this.bookContent(entry, cryostat, vessel, entry.liquidLitres)
    }
  }

  /** Tops the dewars up before today where little is left, so that the coming week can be met. */
  stockUp(leastLitres: number, at: Date) {
    for (const id of this.facility.accounts.dewars) {
      const stock = this.facility.accounts.dewars.reduce((sum, dewar) => sum + (this.balanceMg.get(dewar) ?? 0), 0)
      if (stock < heliumMgFromLitres(leastLitres)) this.refill(this.account(id, 'dewar', 'Dewar'), at)
    }
  }

  private bookTransfer(entry: Entry, cryostat: Cryostat, vessel: HeliumAccount) {
    this.bookContent(entry, cryostat, vessel, entry.beforeLitres ?? 0)
    const takenMg = heliumMgFromLitres(entry.drawnLitres ?? 0)
    const dewar = this.account(entry.fromAccountId!, 'dewar', 'Dewar')
    if ((this.balanceMg.get(dewar.accountId) ?? 0) < takenMg + heliumMgFromLitres(20)) this.refill(dewar, new Date(entry.startedAt!.getTime() - 20 * 3_600_000))
    const arrivedMg = heliumMgFromLitres(entry.liquidLitres ?? 0) - heliumMgFromLitres(entry.beforeLitres ?? 0)
    this.book(transferEntry({ from: dewar, to: vessel, ...this.gas(), takenMg, arrivedMg, recoveredMg: Math.round((takenMg - arrivedMg) * cryostat.recoveryFraction) }), entry.at, 'Transfer', entry)
  }

  private bookContent(entry: Entry, cryostat: Cryostat, vessel: HeliumAccount, litres: number) {
    const gasMg = (this.balanceMg.get(vessel.accountId) ?? 0) - heliumMgFromLitres(litres)
    if (gasMg > 0) this.book(boilOffEntry({ vessel, ...this.gas(), gasMg, recoveredMg: Math.round(gasMg * cryostat.recoveryFraction) }), entry.at, 'Boil-off', entry)
  }

  /** Tops a dewar up: first with what the liquefier made of recovered gas, then by a delivery. */
  private refill(dewar: HeliumAccount, at: Date) {
    const recoveredMg = this.balanceMg.get(this.facility.accounts.recovery) ?? 0
    const roomMg = heliumMgFromLitres(FULL_DEWAR_LITRES) - (this.balanceMg.get(dewar.accountId) ?? 0)
    const liquefiedMg = Math.min(Math.round(recoveredMg * 0.95), Math.round(roomMg * 0.8))
    if (liquefiedMg > heliumMgFromLitres(20)) this.book(liquefactionEntry({ recovery: this.gas().recovery, dewar, amountMg: liquefiedMg }), at, 'Liquefied')
    const amountMg = Math.min(heliumMgFromLitres(DELIVERY_LITRES), heliumMgFromLitres(FULL_DEWAR_LITRES) - (this.balanceMg.get(dewar.accountId) ?? 0))
    const movementId = this.book(deliveryEntry({ supplier: this.account(this.facility.accounts.supplier, 'supplier', 'Supplier'), dewar, amountMg }), at, 'Delivery')
    this.deliveries.push({ dueAt: at, litres: amountMg / heliumMgFromLitres(1), dewarAccountId: dewar.accountId, supplierReference: `HE-${String(this.deliveries.length + 1).padStart(4, '0')}`, receivedAt: at, movementId })
  }

  private gas() {
    return { recovery: this.account(this.facility.accounts.recovery, 'recovery', 'Recovery'), lost: this.account(this.facility.accounts.lost, 'lost', 'Lost') }
  }

  private account(accountId: string, kind: HeliumAccount['kind'], name: string): HeliumAccount {
    return { accountId, kind, name }
  }

  private book(entry: HeliumEntry, at: Date, reason: string, line?: Entry): string {
    const id = uuidv7()
    this.movements.push({ id, at, reason, runId: line?.runId ?? null, entryId: line?.id ?? null, recordedBy: line?.recordedBy ?? null })
    for (const posting of entry.postings) {
      this.postings.push({ ...posting, movementId: id })
      this.balanceMg.set(posting.accountId, (this.balanceMg.get(posting.accountId) ?? 0) + posting.amountMg)
    }
    return id
  }

  /** Writes everything in one transaction, so that the balance checks run once at its end. */
  async write(db: Database, ordered: { dueAt: Date, litres: number }[]) {
    await db.transaction(async (tx) => {
      for (const batch of inBatches(this.movements)) await tx.insert(heliumMovements).values(batch)
      for (const batch of inBatches(this.postings)) await tx.insert(heliumPostings).values(batch)
      for (const batch of inBatches(this.deliveries)) await tx.insert(heliumDeliveries).values(batch)
      if (ordered.length > 0) await tx.insert(heliumDeliveries).values(ordered.map((delivery, index) => ({ ...delivery, dewarAccountId: this.facility.accounts.dewars[index % 2]!, supplierReference: `HE-${String(this.deliveries.length + index + 1).padStart(4, '0')}` })))
    })
  }
}

/** Rows in batches that a statement can carry. */
export function inBatches<Row>(rows: Row[]): Row[][] {
  return Array.from({ length: Math.ceil(rows.length / BATCH) }, (_, index) => rows.slice(index * BATCH, (index + 1) * BATCH))
}
