import type { Pool } from 'pg'
import { RateLimiterPostgres, RateLimiterRes } from 'rate-limiter-flexible'
import { tooMany } from './errors'
import { sha256 } from './person'

/** Wrong passwords allowed in one window before the next try has to wait for the window's end. */
export const TRIES_PER_ACCOUNT = 5
export const TRIES_PER_ADDRESS = 30
export const WINDOW_SECONDS = 5 * 60

/** Where a try comes from and whom it is for. */
export interface Try { email: string, address: string }

export interface SignInLimits {
  /** Counts a try before its password is looked at, so that many at once cannot slip through together; 429 when there are too many. */
  spend: (tried: Try) => Promise<void>
  /** The password was right: the try does not count, and earlier ones of this account are forgotten. */
  forgive: (tried: Try) => Promise<void>
}

const made = new WeakMap<Pool, SignInLimits>()

/**
 * Counts failed sign-ins per account and per address in the database, so that all instances count together. Keys are hashed:
 * the table names nobody.
 */
export function signInLimits(pool: Pool): SignInLimits {
  const known = made.get(pool)
  if (known) return known
  const limiter = (keyPrefix: string, points: number) => new RateLimiterPostgres({
    storeClient: pool, storeType: 'pool', tableName: 'sign_in_limits', tableCreated: true, keyPrefix, points, duration: WINDOW_SECONDS,
  })
  const byAccount = limiter('account', TRIES_PER_ACCOUNT)
  const byAddress = limiter('address', TRIES_PER_ADDRESS)
  const limits: SignInLimits = {
    async spend({ email, address }) {
      const key = sha256(address)
      await spendOn(byAddress, key, 'from this address')
      try {
        await spendOn(byAccount, sha256(email), 'for this account')
      } catch (error) {
        // Refused unlooked at: it tells nothing of the address.
        await byAddress.reward(key)
        throw error
      }
    },
    async forgive({ email, address }) {
      await Promise.all([byAccount.delete(sha256(email)), byAddress.reward(sha256(address))])
    },
  }
  made.set(pool, limits)
  return limits
}

async function spendOn(limiter: RateLimiterPostgres, key: string, whose: string): Promise<void> {
  try {
    await limiter.consume(key)
  } catch (refusal) {
    if (refusal instanceof RateLimiterRes) throw tooMany(`There were too many wrong passwords ${whose}. Try again in ${inWords(refusal.msBeforeNext)}.`)
    throw refusal
  }
}

function inWords(milliseconds: number): string {
  const seconds = Math.max(1, Math.ceil(milliseconds / 1000))
  if (seconds < 90) return seconds === 1 ? '1 second' : `${seconds} seconds`
  return `${Math.ceil(seconds / 60)} minutes`
}
