import nodemailer from 'nodemailer'
import { DomainError } from '#shared/errors'

/** A mail to send. */
export interface Mail {
  to: string
  subject: string
  text: string
  /** The same for a mail sent again, so that a mail client shows it once. */
  messageId: string
  attachments?: { filename: string, content: Buffer, contentType: string }[]
}

/** Sends mails; closed when the server stops. */
export interface MailTransport { send(mail: Mail): Promise<void>, close(): void }

/** Connects to the mail server. */
export function connectMail(config: { smtpUrl: string, from: string }): MailTransport {
  const transport = nodemailer.createTransport(config.smtpUrl, { from: config.from })
  return {
    send: async (mail) => {
      for (const header of [mail.to, mail.subject, mail.messageId]) {
        if (/[\r\n]/.test(header)) throw new DomainError('invalid', 'A mail address or subject holds a line break and was not sent.')
      }
      await transport.sendMail({ ...mail, messageId: `<${mail.messageId}>`, disableFileAccess: true, disableUrlAccess: true })
    },
    close: () => transport.close(),
  }
}
