import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { MailDev } from 'maildev'

/** A running mail fake: takes mail by SMTP and shows it on a web page and at `/api/email`. */
export interface MailFake { smtpPort: number, webPort: number, close(): Promise<void> }

/**
 * Starts the mail fake, on loopback unless a host is given.
 *
 * @param options its two ports
 */
export async function startMailFake({ smtpPort, webPort, host = '127.0.0.1' }: { smtpPort: number, webPort: number, host?: string }): Promise<MailFake> {
  // A folder of its own: several fakes on one machine would otherwise show each other's mail.
  const mailDirectory = await mkdtemp(join(tmpdir(), 'holdtime-mail-'))
  const maildev = new MailDev({ smtp: smtpPort, web: webPort, ip: host, webIp: host, silent: true, mailDirectory })
  await maildev.start()
  return {
    smtpPort, webPort,
    close: async () => {
      await maildev.stop()
      await rm(mailDirectory, { recursive: true, force: true })
    },
  }
}
