import { hash, verify, type Options } from '@node-rs/argon2'
import { DomainError } from '../../../shared/errors'

/** Argon2id with 19 MiB, two passes, one lane (RFC 9106; the least that OWASP's password storage sheet names for it). */
const COST: Options = { memoryCost: 19_456, timeCost: 2, parallelism: 1 }
const AT_ONCE = 2
/** Beyond this many in the queue a caller is better told to come again than left waiting. */
const MOST_WAITING = 40

/**
 * A hash at the same cost that no password belongs to: checking against it takes as long as checking a real one, so
 * the time does not tell whether there is an account.
 */
const NOBODY = '$argon2id$v=19$m=19456,t=2,p=1$aGFydHJvbGwtbm9ib2R5cw$Y1xYt3hH0Dk5m6oQd8k1rJ7o4cVh2eWq9LzB0sXyUaE'

let running = 0
const waiting: (() => void)[] = []

/** At most two at once: each takes 19 MiB and a core. */
async function inTurn<T>(work: () => Promise<T>): Promise<T> {
  if (running >= AT_ONCE) {
    if (waiting.length >= MOST_WAITING) throw new DomainError('too_many_requests', { details: { retryAfter: 2 } })
    await new Promise<void>(resolve => waiting.push(resolve))
  }
  else {
    running++
  }
  try {
    return await work()
  }
  finally {
    const next = waiting.shift()
    if (next) next()
    else running--
  }
}

export function hashPassword(password: string): Promise<string> {
  return inTurn(() => hash(password.normalize('NFC'), COST))
}

/** Whether the password fits. Without a hash (no account, or one without a password) it takes the same time and is false. */
export async function passwordFits(passwordHash: string | null, password: string): Promise<boolean> {
  const fits = await inTurn(() => verify(passwordHash ?? NOBODY, password.normalize('NFC')))
  return fits && passwordHash !== null
}
