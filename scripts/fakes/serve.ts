// Runs the local fakes for the demo and for docker-compose.fake.yml.
import { startMailFake } from './mail'
import { startPaymentsFake } from './payments/server'
import { FAKE_PORTS } from './ports'

// Loopback, but for a container whose ports are mapped to loopback outside.
const host = process.env.FAKES_HOST
const portOf = (variable: string, usual: number) => Number(process.env[variable] ?? usual)

const payments = await startPaymentsFake({
  host,
  port: portOf('PAYMENTS_FAKE_PORT', FAKE_PORTS.payments),
  webhookUrl: process.env.PAYMENTS_WEBHOOK_URL ?? 'http://127.0.0.1:3000/api/payments/webhook',
  webhookSecret: process.env.PAYMENTS_WEBHOOK_SECRET?.split(',')[0] ?? 'whsec_local_fake',
})
const mail = await startMailFake({ host, smtpPort: portOf('MAIL_FAKE_SMTP_PORT', FAKE_PORTS.mailSmtp), webPort: portOf('MAIL_FAKE_WEB_PORT', FAKE_PORTS.mailWeb) })

const stop = async () => {
  await Promise.all([payments.close(), mail.close()])
  process.exit(0)
}
process.on('SIGINT', stop)
process.on('SIGTERM', stop)
