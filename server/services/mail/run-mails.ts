import { formatMoney } from '#shared/utils/format-money'
import { formatInstant, formatSlot } from '#shared/utils/format-date'

/** What a mail about a run may say. */
export interface RunMailFacts {
  number: string
  title: string
  cryostat: string
  group: string
  facility: string
  timeZone: string
  startsAt: Date
  endsAt: Date
  link: string
  currency: string
  depositMinor: number
  payBy: Date | null
  reason?: string
  invoiceNumber?: string
  amountMinor?: number
  actionUrl?: string
}

/** Subject and text of a mail. */
export interface MailText { subject: string, text: string }

/** Mails about a run, by what happened. */
export type RunMailKind = 'approved' | 'confirmed' | 'declined' | 'lapsed' | 'finished' | 'invoiced' | 'balance-paid' | 'balance-failed' | 'balance-confirm' | 'refunded' | 'lost-days'

const TEXTS: Readonly<Record<RunMailKind, (run: RunMailFacts) => { subject: string, lines: string[] }>> = {
  'approved': run => ({
    subject: `Run ${run.number} is approved: pay the deposit by ${formatInstant(run.payBy ?? run.startsAt, run.timeZone)}`,
    lines: [
      `Your run “${run.title}” on ${run.cryostat} is approved.`,
      `To keep the days, pay the deposit of ${formatMoney({ amount: run.depositMinor, currency: run.currency })} by ${formatInstant(run.payBy ?? run.startsAt, run.timeZone)}. After that the days are given free.`,
    ],
  }),
  'confirmed': run => ({
    subject: `Run ${run.number} is confirmed`,
    lines: [
      ...(run.amountMinor ? [`We received the deposit of ${formatMoney({ amount: run.amountMinor, currency: run.currency })}. It is taken off the invoice.`] : []),
      `Your run “${run.title}” on ${run.cryostat} is confirmed. The days are yours.`,
    ],
  }),
  'declined': run => ({ subject: `Run ${run.number} was declined`, lines: [`Your request “${run.title}” on ${run.cryostat} was declined.`, `Reason: ${run.reason ?? ''}`, 'You can plan it again for other days.'] }),
  'lapsed': run => ({ subject: `Run ${run.number} lapsed`, lines: [`The deposit for “${run.title}” on ${run.cryostat} was not paid in time, so its days were given free.`, 'You can ask for days again.'] }),
  'finished': run => ({ subject: `Run ${run.number} is finished`, lines: [`Your run “${run.title}” on ${run.cryostat} is finished. The charges follow from what was logged, and the invoice comes next.`] }),
  'invoiced': run => ({ subject: `Invoice ${run.invoiceNumber} for run ${run.number}`, lines: [`Invoice ${run.invoiceNumber} for “${run.title}” on ${run.cryostat} is attached. It sets the estimate beside what was used.`] }),
  'balance-paid': run => ({ subject: `Payment received for run ${run.number}`, lines: [`We received the balance of ${formatMoney({ amount: run.amountMinor ?? 0, currency: run.currency })} for “${run.title}” on ${run.cryostat}. Nothing more is to be paid.`] }),
  'balance-failed': run => ({ subject: `The balance of run ${run.number} could not be charged`, lines: [`The saved card refused the balance of ${formatMoney({ amount: run.amountMinor ?? 0, currency: run.currency })}.`, 'Please pay the invoice by bank transfer, as it says.'] }),
  'balance-confirm': run => ({ subject: `Confirm the balance of run ${run.number} with your bank`, lines: [`Your bank asks you to confirm the balance of ${formatMoney({ amount: run.amountMinor ?? 0, currency: run.currency })}:`, run.actionUrl ?? run.link] }),
  'refunded': run => ({ subject: `Refund for run ${run.number}`, lines: [`${formatMoney({ amount: run.amountMinor ?? 0, currency: run.currency })} is on its way back to the card that paid the deposit.`] }),
  'lost-days': run => ({ subject: `The days asked for in run ${run.number} are taken`, lines: [`Another run now holds days of your request “${run.title}” on ${run.cryostat}.`, 'Your request stays with the manager, or you can withdraw it and ask for other days.'] }),
}

/**
 * Writes a mail about a run.
 *
 * @param kind what happened
 * @param run the facts
 */
export function writeRunMail(kind: RunMailKind, run: RunMailFacts): MailText {
  const { subject, lines } = TEXTS[kind](run)
  const text = [
    ...lines, '',
    `Run ${run.number}, ${run.group}`,
    `${formatSlot(run.startsAt, run.endsAt, run.timeZone)} (facility time, ${run.timeZone})`,
    run.link, '',
    run.facility,
  ].join('\n')
  return { subject, text }
}
