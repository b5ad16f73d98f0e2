import { formatMoney } from '#shared/utils/format-money'
import type { invoiceLines, invoices, runs } from '#server/db/schema'

/** What an invoice's paper is made from. */
export interface InvoicePaper {
  invoice: typeof invoices.$inferSelect
  lines: readonly (typeof invoiceLines.$inferSelect)[]
  run: Pick<typeof runs.$inferSelect, 'number' | 'title' | 'slot' | 'startedAt' | 'finishedAt' | 'cutShort'>
  cryostat: string
  timeZone: string
  /** The invoice that a credit note corrects. */
  corrects?: { number: string, issuedOn: string } | null
}

/** What the paper is, as its title says. */
export function titleOf({ invoice }: InvoicePaper): string {
  return `${invoice.kind === 'invoice' ? 'Invoice' : 'Credit note'} ${invoice.number}`
}

/** Money of the invoice's currency, with spaces that are still seen in small print. */
export function moneyOf({ invoice }: InvoicePaper, amountMinor: number): string {
  return formatMoney({ amount: amountMinor, currency: invoice.currency }).replaceAll('\u2009', '\u00A0')
}
