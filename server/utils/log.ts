import pino from 'pino'

/** One JSON object a line, so that no input can forge a line; nothing secret is ever passed to it. */
export const log = pino({
  level: process.env.LOG_LEVEL ?? 'info',
  redact: ['password', 'token', 'cookie', 'authorization', '*.password', '*.token'],
})
