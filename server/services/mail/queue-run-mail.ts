import { eq } from 'drizzle-orm'
import type { Database } from '#server/db/client'
import { cryostats, groups } from '#server/db/schema'
import { enqueueJob } from '#server/jobs/queue'
import { readFacility } from '#server/services/facility/queries'
import type { Run } from '#server/services/runs/change-state'
import { useServerConfig } from '#server/utils/config'
import { findRunRecipients } from './recipients'
import { type RunMailFacts, type RunMailKind, writeRunMail } from './run-mails'

/** What only some mails say. */
type MailDetails = Pick<RunMailFacts, 'reason' | 'invoiceNumber' | 'amountMinor' | 'actionUrl'> & { attachInvoiceId?: string }

/**
 * Queues mails about a run in the caller's transaction: to the person who asked and the group's PIs; an invoice goes
 * to the group's accounts as well. Each address gets each mail of a state once.
 *
 * @param tx transaction of what happened
 * @param kind what happened
 * @param run the run as it stands now
 * @param details what only this mail says
 */
export async function queueRunMail(tx: Database, kind: RunMailKind, run: Run, details: MailDetails = {}): Promise<void> {
  const { attachInvoiceId, ...facts } = details
  const [cryostat] = await tx.select({ name: cryostats.name }).from(cryostats).where(eq(cryostats.id, run.cryostatId))
  const [group] = await tx.select({ name: groups.name }).from(groups).where(eq(groups.id, run.groupId))
  const facility = await readFacility(tx)
  const recipients = await findRunRecipients(tx, run)
  const mail = writeRunMail(kind, {
    ...facts, number: String(run.number).padStart(4, '0'), title: run.title, cryostat: cryostat!.name, group: group!.name, facility: facility.name, timeZone: facility.timeZone,
    startsAt: run.slot.startsAt, endsAt: run.slot.endsAt, link: `${useServerConfig().origin}/runs/${run.id}`, currency: facility.currency, depositMinor: run.quote.depositMinor, payBy: run.payBy,
  })
  const addresses = new Set([recipients.requester, ...recipients.pis, ...(kind === 'invoiced' ? [recipients.invoices] : [])])
  for (const to of addresses) await enqueueJob(tx, 'send-mail', { ...mail, to, key: `${kind}:${run.id}:${run.version}:${to}`, ...(attachInvoiceId ? { attachInvoiceId } : {}) })
}
