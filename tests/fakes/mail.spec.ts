import { afterAll, beforeAll, expect, it } from 'vitest'
import { connectMail } from '#server/adapters/mail/transport'
import { type MailFake, startMailFake } from '../../scripts/fakes/mail'
import { freePort } from '../support/postgres'

let fake: MailFake
beforeAll(async () => {
  fake = await startMailFake({ smtpPort: await freePort(), webPort: await freePort() })
})
afterAll(() => fake.close())

it('delivers a mail with its attachment to the mail fake', async () => {
  const mail = connectMail({ smtpUrl: `smtp://127.0.0.1:${fake.smtpPort}`, from: 'desk@skerry.example' })
  await mail.send({ to: 'pi@alder.example', subject: 'Invoice 2026-0001', text: 'Attached. Θ_D, γ.', messageId: 'one@holdtime', attachments: [{ filename: 'invoice.pdf', content: Buffer.from('%PDF-1.7'), contentType: 'application/pdf' }] })
  mail.close()
  const [received] = await (await fetch(`http://127.0.0.1:${fake.webPort}/api/email`)).json() as { subject: string, text: string, attachments: { filename: string }[] }[]
  expect(received).toMatchObject({ subject: 'Invoice 2026-0001', attachments: [{ filename: 'invoice.pdf' }] })
  expect(received?.text).toContain('Θ_D, γ')
})

it('sends nothing whose header holds a line break', async () => {
  const mail = connectMail({ smtpUrl: `smtp://127.0.0.1:${fake.smtpPort}`, from: 'desk@skerry.example' })
  await expect(mail.send({ to: 'a@alder.example', subject: 'Run\r\nBcc: everyone@alder.example', text: '', messageId: 'two@holdtime' })).rejects.toThrow('line break')
  mail.close()
})
