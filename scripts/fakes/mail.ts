import { MailDev } from 'maildev'

/** A running mail fake: takes mail by SMTP and shows it on a web page and at `/api/email`. */
export interface MailFake { smtpPort: number, webPort: number, close(): Promise<void> }

/** Starts the mail fake on loopback. */
export async function startMailFake({ smtpPort, webPort }: { smtpPort: number, webPort: number }): Promise<MailFake> {
  const maildev = new MailDev({ smtp: smtpPort, web: webPort, ip: '127.0.0.1', webIp: '127.0.0.1', silent: true })
  await maildev.start()
  return { smtpPort, webPort, close: () => maildev.stop() }
}
