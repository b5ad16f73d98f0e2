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

it.each([
  ['subject', { subject: 'Run\r\nBcc: everyone@alder.example' }],
  ['address', { to: 'a@alder.example\nBcc: everyone@alder.example' }],
  ['message id', { messageId: 'two@holdtime>\r\nX-Other: 1' }],
  ['file name', { attachments: [{ filename: 'a.pdf\r\nX-Other: 1', content: Buffer.from(''), contentType: 'application/pdf' }] }],
])('sends nothing whose %s holds a line break', async (_, changes) => {
  const mail = connectMail({ smtpUrl: `smtp://127.0.0.1:${fake.smtpPort}`, from: 'desk@skerry.example' })
  await expect(mail.send({ to: 'a@alder.example', subject: 'Run 0218', text: '', messageId: 'two@holdtime', ...changes })).rejects.toMatchObject({ code: 'invalid', message: expect.stringContaining('line break') })
  mail.close()
  expect(await (await fetch(`http://127.0.0.1:${fake.webPort}/api/email`)).json()).toHaveLength(1)
})

it('shows only its own mail, not that of another fake', async () => {
  const other = await startMailFake({ smtpPort: await freePort(), webPort: await freePort() })
  expect(await (await fetch(`http://127.0.0.1:${other.webPort}/api/email`)).json()).toEqual([])
  await other.close()
})
