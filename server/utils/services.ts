import { connectMail, type MailTransport } from '#server/adapters/mail/transport'
import { connectPayments, type Payments } from '#server/adapters/payments/client'
import { useServerConfig } from './config'

let payments: Payments | undefined
let mail: MailTransport | undefined

/** The payment provider, connected at first use. */
export function usePayments(): Payments {
  payments ??= connectPayments(useServerConfig().payments)
  return payments
}

/** The mail server, connected at first use. */
export function useMail(): MailTransport {
  mail ??= connectMail(useServerConfig().mail)
  return mail
}
