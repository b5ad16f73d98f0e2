/** One line of an invoice list. */
export interface InvoiceListItem {
  id: string
  number: string
  kind: 'invoice' | 'credit-note'
  issuedOn: string
  group: string
  runId: string
  runNumber: number
  runTitle: string
  totalMinor: number
  dueMinor: number
  currency: string
  /** Whether the run it belongs to is settled. */
  isSettled: boolean
}

/** An invoice as its page shows it. */
export interface InvoiceDetail extends InvoiceListItem {
  dueOn: string | null
  suppliedOn: string
  seller: { name: string, addressLines: string[], email: string, vatId: string | null }
  buyer: { name: string, addressLines: string[], email: string, vatId: string | null }
  reference: string
  vatBasisPoints: number
  reverseCharge: boolean
  netMinor: number
  vatMinor: number
  prepaidMinor: number
  paymentText: string
  /** SHA-256 of the PDF, once it is rendered. */
  pdfSha256: string | null
  lines: { position: number, label: string, unit: string, quantity: number, estimatedQuantity: number | null, unitPriceMinor: number, netMinor: number, estimatedNetMinor: number | null }[]
  payments: { kind: 'deposit' | 'balance' | 'refund', state: string, amountMinor: number, at: string, failure: string | null, actionUrl: string | null }[]
}

/** What a PI sees of the group's account. */
export interface GroupAccount {
  id: string
  name: string
  class: 'internal' | 'academic' | 'industry'
  institution: string
  currency: string
  timeZone: string
  year: number
  capMinor: number | null
  /** Likely totals of runs that hold days this year, not yet invoiced. */
  committedMinor: number
  /** Totals of this year's invoices less credit notes. */
  invoicedMinor: number
  costCodes: string[]
  members: { name: string, email: string, role: 'member' | 'pi' }[]
  invoices: InvoiceListItem[]
}
