/** Where the local fakes listen unless told otherwise; docker-compose.fake.yml maps the same (a test compares them). */
export const FAKE_PORTS = {
  payments: 12111,
  mailSmtp: 1025,
  mailWeb: 1080,
  postgres: 5432,
} as const

/** The variables that move the fakes to other ports. */
export const FAKE_PORT_VARIABLES = {
  payments: 'PAYMENTS_FAKE_PORT',
  mailSmtp: 'MAIL_FAKE_SMTP_PORT',
  mailWeb: 'MAIL_FAKE_WEB_PORT',
} as const

/** The port of a fake: from the environment, or the usual one. */
export function fakePort(fake: keyof typeof FAKE_PORT_VARIABLES): number {
  const variable = FAKE_PORT_VARIABLES[fake]
  const given = process.env[variable]
  const port = given === undefined || given === '' ? FAKE_PORTS[fake] : Number(given)
  if (!Number.isInteger(port) || port < 1 || port > 65_535) throw new Error(`${variable} is "${given}". Give a port between 1 and 65535.`)
  return port
}
