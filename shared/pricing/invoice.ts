import { type ChargeKind, type ChargeLine, netOf } from '#shared/pricing/lines'
import { vatOn } from '#shared/pricing/quote'

/** One line of an invoice: what was estimated beside what was used. */
export interface InvoiceLine extends ChargeLine {
  readonly estimatedQuantity: number | null
  readonly estimatedNetMinor: number | null
}

/** Amounts of an invoice, minor units, named after EN 16931. */
export interface InvoiceAmounts {
  /** BT-109: sum of the lines, exact. */
  readonly netMinor: number
  /** BT-110: VAT, rounded once for the one category of the invoice. */
  readonly vatMinor: number
  /** BT-112: net and VAT. */
  readonly totalMinor: number
  /** BT-113: what was paid before. */
  readonly prepaidMinor: number
  /** BT-115: still to pay; negative when more was paid before, and is refunded. */
  readonly dueMinor: number
}

/**
 * Sets the actual lines beside the estimated ones, in the order of the actual ones, and keeps estimated lines of which
 * nothing was used, with a quantity of zero, so that the estimates still add up to the quote.
 *
 * @param actual lines priced from the log
 * @param estimated lines of the quote
 */
export function besideEstimate(actual: readonly ChargeLine[], estimated: readonly ChargeLine[]): InvoiceLine[] {
  const estimateOf = (kind: ChargeKind) => estimated.find(line => line.kind === kind)
  const used = actual.map((line): InvoiceLine => ({ ...line, estimatedQuantity: estimateOf(line.kind)?.quantity ?? null, estimatedNetMinor: estimateOf(line.kind)?.netMinor ?? null }))
  const unused = estimated.filter(line => !actual.some(({ kind }) => kind === line.kind))
    .map((line): InvoiceLine => ({ ...line, quantity: 0, netMinor: 0, estimatedQuantity: line.quantity, estimatedNetMinor: line.netMinor }))
  return [...used, ...unused]
}

/**
 * The amounts of an invoice by the arithmetic of EN 16931: lines are rounded already (BR-CO-10), VAT is the rounded base
 * times the rate (BR-CO-17), the rest adds up exactly (BR-CO-13, -15, -16).
 *
 * @param lines with net amounts in minor units
 * @param vat rate in basis points and whether the customer accounts for it
 * @param prepaidMinor deposit that was paid
 */
export function invoiceAmounts(lines: readonly Pick<ChargeLine, 'netMinor'>[], vat: { readonly vatBasisPoints: number, readonly reverseCharge: boolean }, prepaidMinor: number): InvoiceAmounts {
  const netMinor = netOf(lines)
  const vatMinor = vatOn(netMinor, vat.vatBasisPoints, vat.reverseCharge)
  const totalMinor = netMinor + vatMinor
  return { netMinor, vatMinor, totalMinor, prepaidMinor, dueMinor: totalMinor - prepaidMinor }
}
