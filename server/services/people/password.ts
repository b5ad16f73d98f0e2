import { hash, verify } from '@node-rs/argon2'

// OWASP ASVS 5.0 appendix C: argon2id, one pass, at least 46 MiB, one lane.
const PARAMETERS = { memoryCost: 47_104, timeCost: 1, parallelism: 1 }
const CONCURRENT_HASHES = 4

let running = 0
const waiting: (() => void)[] = []

/** At most four hashes at once, 46 MiB each, so that a flood of sign-ins cannot exhaust memory. */
async function oneOfFew<T>(work: () => Promise<T>): Promise<T> {
  if (running >= CONCURRENT_HASHES) await new Promise<void>(resolve => waiting.push(resolve))
  running += 1
  try {
    return await work()
  }
  finally {
    running -= 1
    waiting.shift()?.()
  }
}

/**
 * Hashes a password with argon2id after NFKC, so that the same characters typed on another keyboard match.
 *
 * @param password as typed
 */
export function hashPassword(password: string): Promise<string> {
  return oneOfFew(() => hash(password.normalize('NFKC'), PARAMETERS))
}

/**
 * Whether a password matches its hash.
 *
 * @param passwordHash as stored
 * @param password as typed
 */
export function verifyPassword(passwordHash: string, password: string): Promise<boolean> {
  return oneOfFew(() => verify(passwordHash, password.normalize('NFKC')))
}
