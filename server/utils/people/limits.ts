import { RateLimiterDrizzle } from 'rate-limiter-flexible'
import { PER_ACCOUNT, PER_ADDRESS, SIGN_IN_WINDOW_MINUTES } from '../../../shared/schemas/people'
import { rateLimits } from '../../database/schema'
import { useDatabase } from '../database'

const SECONDS = SIGN_IN_WINDOW_MINUTES * 60

const limiter = (keyPrefix: string, points: number) => new RateLimiterDrizzle({ storeClient: useDatabase(), schema: rateLimits, keyPrefix, points, duration: SECONDS, clearExpiredByTimeout: false })

/** Seconds until this account or address may try again; 0 when it may now. */
export async function signInWait(email: string, address: string): Promise<number> {
  const [account, place] = await Promise.all([limiter('account', PER_ACCOUNT).get(email), limiter('address', PER_ADDRESS).get(address)])
  const wait = Math.max(
    account && account.consumedPoints >= PER_ACCOUNT ? account.msBeforeNext : 0,
    place && place.consumedPoints >= PER_ADDRESS ? place.msBeforeNext : 0,
  )
  return Math.ceil(wait / 1000)
}

/** Counts a wrong password. */
export async function countWrongPassword(email: string, address: string): Promise<void> {
  await Promise.all([limiter('account', PER_ACCOUNT).penalty(email), limiter('address', PER_ADDRESS).penalty(address)])
}

/** A right password clears the account's count, not the address's. */
export async function clearWrongPasswords(email: string): Promise<void> {
  await limiter('account', PER_ACCOUNT).delete(email)
}
