import { RateLimiterDrizzle } from 'rate-limiter-flexible'
import { PER_ACCOUNT, PER_ADDRESS, RESETS_PER_ACCOUNT, RESETS_PER_ADDRESS, SIGN_IN_WINDOW_MINUTES } from '../../../shared/schemas/people'
import { rateLimits } from '../../database/schema'
import { useDatabase } from '../database'

const SECONDS = SIGN_IN_WINDOW_MINUTES * 60

const limiter = (keyPrefix: string, points: number, duration = SECONDS) => new RateLimiterDrizzle({ storeClient: useDatabase(), schema: rateLimits, keyPrefix, points, duration, clearExpiredByTimeout: false })

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

/** Counts a wish for a link to a new password; seconds until this address may ask again, 0 when it may now. */
export async function resetWait(address: string): Promise<number> {
  const { consumedPoints, msBeforeNext } = await limiter('reset-address', RESETS_PER_ADDRESS, 3600).penalty(address)
  return consumedPoints > RESETS_PER_ADDRESS ? Math.ceil(msBeforeNext / 1000) : 0
}

/** Counts a wish for an account's link, and says whether it is granted. */
export async function mayReset(email: string): Promise<boolean> {
  return (await limiter('reset-account', RESETS_PER_ACCOUNT, 3600).penalty(email)).consumedPoints <= RESETS_PER_ACCOUNT
}
