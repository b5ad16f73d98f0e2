import { DomainError } from '#shared/errors'

/** Kinds of accounts between which helium moves. Supplier and lost lie outside the facility and may have any balance. */
export const HELIUM_ACCOUNT_KINDS = ['supplier', 'dewar', 'cryostat', 'recovery', 'lost'] as const

/** One kind of account. */
export type HeliumAccountKind = typeof HELIUM_ACCOUNT_KINDS[number]

/** An account that helium is booked to. */
export interface HeliumAccount {
  readonly accountId: string
  readonly kind: HeliumAccountKind
  /** Name for sentences, e.g. `Dewar D1`. */
  readonly name: string
}

/** One line of an entry: what an account gains (above zero) or gives (below zero). */
export interface HeliumPosting {
  readonly accountId: string
  /** Mass, whole milligrams, never zero. */
  readonly amountMg: number
}

/** What a movement is. */
export const HELIUM_ENTRY_KINDS = ['delivery', 'transfer', 'boil-off', 'liquefaction', 'return', 'stock-take', 'correction'] as const

/** One kind of movement. */
export type HeliumEntryKind = typeof HELIUM_ENTRY_KINDS[number]

/** A balanced movement: its postings sum to zero. */
export interface HeliumEntry {
  readonly kind: HeliumEntryKind
  readonly postings: readonly HeliumPosting[]
  /** Why, where a person must say so (stock-take, correction). */
  readonly reason?: string
}

/**
 * Refuses postings that are not a balanced movement.
 *
 * @param postings Lines of an entry.
 * @returns The same lines, known to be sound.
 * @throws DomainError when there are fewer than two lines, an account twice, an amount that is zero or no whole number, or a sum other than zero.
 */
export function checkBalanced(postings: readonly HeliumPosting[]): readonly HeliumPosting[] {
  if (postings.length < 2) throw new DomainError('invalid', 'A helium movement needs an account that gives and one that takes.', ['postings'])
  const seen = new Set<string>()
  let sumMg = 0
  postings.forEach(({ accountId, amountMg }, line) => {
    if (!Number.isSafeInteger(amountMg) || amountMg === 0) {
      throw new DomainError('invalid', `Line ${line + 1} of the helium movement is not a whole number of milligrams other than zero.`, ['postings', line, 'amountMg'])
    }
    if (seen.has(accountId)) {
      throw new DomainError('invalid', `Line ${line + 1} of the helium movement names an account for the second time. Choose two different accounts.`, ['postings', line, 'accountId'])
    }
    seen.add(accountId)
    sumMg += amountMg
  })
  if (sumMg !== 0) {
    throw new DomainError('invalid', `The helium movement does not balance: ${sumMg}\u2009mg are left over. What one account gives, others must take.`, ['postings'])
  }
  return postings
}

/**
 * Makes an entry from lines, leaving out lines of zero.
 *
 * @param kind What the movement is.
 * @param lines Postings, zero lines allowed.
 * @param reason Why, where a person must say so.
 * @returns The balanced entry.
 * @throws DomainError as `checkBalanced`.
 */
export function heliumEntry(kind: HeliumEntryKind, lines: readonly HeliumPosting[], reason?: string): HeliumEntry {
  const postings = checkBalanced(lines.filter(line => line.amountMg !== 0))
  return reason === undefined ? { kind, postings } : { kind, postings, reason }
}

/**
 * Refuses an account of another kind than the movement needs.
 *
 * @param account The account given.
 * @param kinds Kinds that may stand here.
 * @param path Field of the account, for the message.
 * @throws DomainError naming the account and the kinds that may stand here.
 */
export function checkKind(account: HeliumAccount, kinds: readonly HeliumAccountKind[], path: string): void {
  if (!kinds.includes(account.kind)) {
    throw new DomainError('invalid', `${account.name} cannot stand here. Choose an account of the kind ${kinds.join(' or ')}.`, [path])
  }
}

/**
 * Refuses an amount that is no mass.
 *
 * @param amountMg Mass, mg.
 * @param path Field, for the message.
 * @param smallest Smallest mass allowed, mg; 1 when left out.
 * @returns The same mass.
 * @throws DomainError when the mass is no whole number or too small.
 */
export function checkAmount(amountMg: number, path: string, smallest: 0 | 1 = 1): number {
  if (!Number.isSafeInteger(amountMg) || amountMg < smallest) {
    const bound = smallest === 1 ? 'above zero' : 'of zero or more'
    throw new DomainError('invalid', `The amount of helium must be ${bound}, in whole milligrams. Enter a larger amount.`, [path])
  }
  return amountMg
}

/**
 * Adds entries up to balances.
 *
 * @param entries Balanced entries, any order.
 * @param opening Balances before them, mg by account.
 * @returns Balance of each account that had an opening balance or a posting, mg.
 */
export function heliumBalances(entries: Iterable<HeliumEntry>, opening: ReadonlyMap<string, number> = new Map()): Map<string, number> {
  const balances = new Map(opening)
  for (const { postings } of entries) {
    for (const { accountId, amountMg } of postings) balances.set(accountId, (balances.get(accountId) ?? 0) + amountMg)
  }
  return balances
}

/**
 * Refuses an entry that would take more from a dewar, a cryostat or recovery than the books say it holds.
 *
 * @param entry The entry about to be posted.
 * @param accounts Accounts it touches.
 * @param balancesMg Balances before it, mg by account; an account without one holds nothing.
 * @throws DomainError of code `conflict` naming the account and the remedy.
 */
export function checkCovered(entry: HeliumEntry, accounts: readonly HeliumAccount[], balancesMg: ReadonlyMap<string, number>): void {
  for (const { accountId, amountMg } of entry.postings) {
    const account = accounts.find(candidate => candidate.accountId === accountId)
    if (!account) throw new DomainError('not-found', 'The helium movement names an account that does not exist. Choose one from the list.', ['postings'])
    if (account.kind === 'supplier' || account.kind === 'lost') continue
    const balanceMg = balancesMg.get(accountId) ?? 0
    if (amountMg < 0 && balanceMg + amountMg < 0) {
      throw new DomainError('conflict', `By the books ${account.name} holds ${(balanceMg / 1000).toFixed(0)}\u2009g of helium, less than the ${(-amountMg / 1000).toFixed(0)}\u2009g taken. Check the reading, or post a stock-take first.`, ['postings'])
    }
  }
}
