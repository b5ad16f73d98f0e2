// Runs the local fakes for the demo and for docker-compose.fake.yml.
import { join } from 'node:path'
import { startMailFake } from './mail'
import { startPaymentsFake } from './payments/server'
import { fakePort } from './ports'

// Loopback, unless they run in a container and the container's ports are mapped to loopback.
const host = process.env.FAKES_HOST ?? '127.0.0.1'
const payments = await startPaymentsFake({
  port: fakePort('payments'),
  host,
  publicUrl: process.env.PAYMENTS_FAKE_URL,
  webhookUrl: process.env.PAYMENTS_WEBHOOK_URL ?? 'http://127.0.0.1:3000/api/payments/webhook',
  stateFile: process.env.HOLDTIME_DATA ? join(process.env.HOLDTIME_DATA, 'payments-fake.json') : undefined,
  webhookSecret: process.env.PAYMENTS_WEBHOOK_SECRET?.split(',')[0] ?? 'whsec_local_fake',
})
const mail = await startMailFake({ smtpPort: fakePort('mailSmtp'), webPort: fakePort('mailWeb'), host })

const stop = async () => {
  await Promise.all([payments.close(), mail.close()])
  process.exit(0)
}
process.on('SIGINT', () => void stop())
process.on('SIGTERM', () => void stop())
