/** Builders of the movements a facility knows; each returns a balanced entry of `entries.ts`. */
import { DomainError } from '#shared/errors'
import { checkAmount, checkKind, heliumEntry } from '#shared/helium/entries'
import type { HeliumAccount, HeliumEntry } from '#shared/helium/entries'

/** Accounts that helium gas leaves to: what is caught and what is not. */
export interface GasAccounts {
  readonly recovery: HeliumAccount
  readonly lost: HeliumAccount
}

/** Splits gas between recovery and lost. */
function gasLines({ recovery, lost }: GasAccounts, gasMg: number, recoveredMg: number): { accountId: string, amountMg: number }[] {
  checkKind(recovery, ['recovery'], 'recovery')
  checkKind(lost, ['lost'], 'lost')
  checkAmount(recoveredMg, 'recoveredMg', 0)
  if (recoveredMg > gasMg) {
    throw new DomainError('invalid', 'More helium is said to be recovered than went into gas. Enter a smaller recovered amount.', ['recoveredMg'])
  }
  return [
    { accountId: recovery.accountId, amountMg: recoveredMg },
    { accountId: lost.accountId, amountMg: gasMg - recoveredMg },
  ]
}

/**
 * A delivery: helium from a supplier into a storage dewar.
 *
 * @param delivery Supplier, dewar and mass that arrived, mg.
 * @returns Balanced entry; the only one by which the facility gains helium.
 * @throws DomainError for accounts of another kind or an amount not above zero.
 */
export function deliveryEntry(
  { supplier, dewar, amountMg }: { readonly supplier: HeliumAccount, readonly dewar: HeliumAccount, readonly amountMg: number },
): HeliumEntry {
  checkKind(supplier, ['supplier'], 'supplier')
  checkKind(dewar, ['dewar'], 'dewar')
  checkAmount(amountMg, 'amountMg')
  return heliumEntry('delivery', [
    { accountId: supplier.accountId, amountMg: -amountMg },
    { accountId: dewar.accountId, amountMg },
  ])
}

/** A transfer of liquid between vessels. */
export interface HeliumTransfer extends GasAccounts {
  readonly from: HeliumAccount
  readonly to: HeliumAccount
  /** Mass that left the dewar, mg. */
  readonly takenMg: number
  /** Mass that arrived, mg; the rest became gas in the line. */
  readonly arrivedMg: number
  /** Mass of that gas caught by recovery, mg; what is not caught is lost. */
  readonly recoveredMg?: number
}

/**
 * A transfer from a dewar to a cryostat or another dewar (or back), with what the line turns into gas.
 *
 * @param transfer Accounts and masses, mg.
 * @returns Balanced entry.
 * @throws DomainError for accounts of another kind, the same vessel twice, more arrived than taken, or more recovered than became gas.
 */
export function transferEntry({ from, to, takenMg, arrivedMg, recoveredMg = 0, ...gas }: HeliumTransfer): HeliumEntry {
  checkKind(from, ['dewar', 'cryostat'], 'from')
  checkKind(to, ['dewar', 'cryostat'], 'to')
  if (from.accountId === to.accountId) {
    throw new DomainError('invalid', `Helium cannot be transferred from ${from.name} to itself. Choose another vessel.`, ['to'])
  }
  checkAmount(takenMg, 'takenMg')
  checkAmount(arrivedMg, 'arrivedMg', 0)
  if (arrivedMg > takenMg) {
    throw new DomainError('invalid', `More helium arrived in ${to.name} than left ${from.name}. Check the two readings before and after the transfer.`, ['arrivedMg'])
  }
  return heliumEntry('transfer', [
    { accountId: from.accountId, amountMg: -takenMg },
    { accountId: to.accountId, amountMg: arrivedMg },
    ...gasLines(gas, takenMg - arrivedMg, recoveredMg),
  ])
}

/**
 * Boil-off: liquid of a vessel that became gas, partly caught by recovery.
 *
 * @param boilOff Vessel, mass that became gas and mass recovered of it, mg.
 * @returns Balanced entry.
 * @throws DomainError for accounts of another kind, an amount not above zero, or more recovered than became gas.
 */
export function boilOffEntry(
  { vessel, gasMg, recoveredMg, ...gas }: GasAccounts & { readonly vessel: HeliumAccount, readonly gasMg: number, readonly recoveredMg: number },
): HeliumEntry {
  checkKind(vessel, ['dewar', 'cryostat'], 'vessel')
  checkAmount(gasMg, 'gasMg')
  return heliumEntry('boil-off', [
    { accountId: vessel.accountId, amountMg: -gasMg },
    ...gasLines(gas, gasMg, recoveredMg),
  ])
}

/**
 * Liquefaction: recovered gas that became liquid in a dewar again.
 *
 * @param liquefaction Recovery, dewar and mass, mg.
 * @returns Balanced entry.
 * @throws DomainError for accounts of another kind or an amount not above zero.
 */
export function liquefactionEntry(
  { recovery, dewar, amountMg }: { readonly recovery: HeliumAccount, readonly dewar: HeliumAccount, readonly amountMg: number },
): HeliumEntry {
  checkKind(recovery, ['recovery'], 'recovery')
  checkKind(dewar, ['dewar'], 'dewar')
  checkAmount(amountMg, 'amountMg')
  return heliumEntry('liquefaction', [
    { accountId: recovery.accountId, amountMg: -amountMg },
    { accountId: dewar.accountId, amountMg },
  ])
}

/**
 * A return to the supplier: recovered gas, or a dewar sent back with liquid in it.
 *
 * @param giveBack Account that gives, supplier, and mass, mg.
 * @returns Balanced entry.
 * @throws DomainError for accounts of another kind or an amount not above zero.
 */
export function returnEntry(
  { from, supplier, amountMg }: { readonly from: HeliumAccount, readonly supplier: HeliumAccount, readonly amountMg: number },
): HeliumEntry {
  checkKind(from, ['recovery', 'dewar'], 'from')
  checkKind(supplier, ['supplier'], 'supplier')
  checkAmount(amountMg, 'amountMg')
  return heliumEntry('return', [
    { accountId: from.accountId, amountMg: -amountMg },
    { accountId: supplier.accountId, amountMg },
  ])
}

/**
 * A stock-take: brings an account to what was counted and posts the difference to `lost`, with a reason.
 *
 * @param stockTake Account, lost, balance by the books and mass counted, mg, and the reason in words.
 * @returns Balanced entry, or undefined when the count agrees with the books and there is nothing to post.
 * @throws DomainError for accounts of another kind, an amount below zero, or a missing reason.
 */
export function stockTakeEntry(
  { account, lost, bookMg, countedMg, reason }:
  { readonly account: HeliumAccount, readonly lost: HeliumAccount, readonly bookMg: number, readonly countedMg: number, readonly reason: string },
): HeliumEntry | undefined {
  checkKind(account, ['dewar', 'cryostat', 'recovery'], 'account')
  checkKind(lost, ['lost'], 'lost')
  checkAmount(countedMg, 'countedMg', 0)
  if (!Number.isSafeInteger(bookMg)) throw new DomainError('invalid', 'The balance by the books is not a whole number of milligrams.', ['bookMg'])
  const differenceMg = countedMg - bookMg
  if (differenceMg === 0) return undefined
  if (reason.trim() === '') throw new DomainError('invalid', 'A stock-take that differs from the books needs a reason. Say what you think happened.', ['reason'])
  return heliumEntry('stock-take', [
    { accountId: account.accountId, amountMg: differenceMg },
    { accountId: lost.accountId, amountMg: -differenceMg },
  ], reason.trim())
}

/**
 * A correction: takes an entry back by its mirror image; the wrong one stays in the books.
 *
 * @param entry The entry to take back.
 * @param reason Why, in words.
 * @returns Balanced entry.
 * @throws DomainError without a reason.
 */
export function correctionEntry(entry: HeliumEntry, reason: string): HeliumEntry {
  if (reason.trim() === '') throw new DomainError('invalid', 'A correction needs a reason. Say what was wrong with the entry.', ['reason'])
  return heliumEntry('correction', entry.postings.map(({ accountId, amountMg }) => ({ accountId, amountMg: -amountMg })), reason.trim())
}
