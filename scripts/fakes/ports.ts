/** Where the local fakes listen unless told otherwise; docker-compose.fake.yml maps the same. */
export const FAKE_PORTS = {
  payments: 12111,
  mailSmtp: 1025,
  mailWeb: 1080,
  postgres: 5432,
} as const
