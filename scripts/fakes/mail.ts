import { MailDev } from 'maildev'

/** A running mail fake: takes mail by SMTP and shows it on a web page and at `/api/email`. */
export interface MailFake { smtpPort: number, webPort: number, close(): Promise<void> }

/** Starts the mail fake, on loopback unless told otherwise. */
export async function startMailFake({ smtpPort, webPort, host = '127.0.0.1' }: { smtpPort: number, webPort: number, host?: string }): Promise<MailFake> {
  const maildev = new MailDev({ smtp: smtpPort, web: webPort, ip: host, webIp: host, silent: true })
  await maildev.start()
  return { smtpPort, webPort, close: () => maildev.stop() }
}
