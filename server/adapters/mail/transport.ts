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

const ANSWER_WITHIN_MS = 20_000

/**
 * Connects to the mail server.
 *
 * @param config its address and the facility's sender address
 */
export function connectMail(config: { smtpUrl: string, from: string }): MailTransport {
  const transport = nodemailer.createTransport({ url: config.smtpUrl, connectionTimeout: ANSWER_WITHIN_MS, greetingTimeout: ANSWER_WITHIN_MS, socketTimeout: ANSWER_WITHIN_MS }, { from: config.from })
  return {
    send: async (mail) => {
      refuseLineBreaks(mail)
      await transport.sendMail({ ...mail, messageId: `<${mail.messageId}>`, disableFileAccess: true, disableUrlAccess: true })
    },
    close: () => transport.close(),
  }
}

/** A line break in a header would begin another header, such as a hidden copy. */
function refuseLineBreaks({ to, subject, messageId, attachments = [] }: Mail) {
  const headers = [to, subject, messageId, ...attachments.flatMap(({ filename, contentType }) => [filename, contentType])]
  if (headers.some(header => /[\r\n\u2028\u2029\0]/.test(header))) throw new DomainError('invalid', 'A mail address, subject or file name holds a line break. The mail was not sent.')
}
