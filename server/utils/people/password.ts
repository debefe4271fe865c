import { randomBytes } from 'node:crypto'
import { hash, verify } from '@node-rs/argon2'

// OWASP's Password Storage cheat sheet: argon2id, 19 MiB, two passes, one lane (from memory).
const COST = { memoryCost: 19_456, timeCost: 2, parallelism: 1 }
/** Hash of a password nobody has: an unknown account costs the same time as a wrong password. */
const NOBODY = hash('an account that is not there', COST)

/** argon2id hash in its usual text form. */
export function hashPassword(password: string): Promise<string> {
  return hash(password, COST)
}

/** A password that nobody knows, for an account whose owner has yet to choose theirs. */
export function nobodysPassword(): string {
  return randomBytes(32).toString('base64url')
}

/** Whether the password is right; false for a missing hash, after the same work. */
export async function passwordMatches(stored: string | null, password: string): Promise<boolean> {
  const right = await verify(stored ?? await NOBODY, password)
  return right && stored !== null
}
