import 'server-only'
import { createHash } from 'node:crypto'
import { database } from '@/db'
import { countAttempt, returnAttempt, type Limit } from '@/db/queries/rate-limits'
import { askerOf } from './client-address'
import { AppError } from './errors'

const QUARTER_HOUR = 900
const HOUR = 3600

/** How often within how many seconds. Addresses that can't be told apart share one count, so it is larger. */
const LIMITS = {
  'sign-in account': { most: 5, windowSeconds: QUARTER_HOUR },
  'sign-in address': { most: 50, windowSeconds: QUARTER_HOUR },
  'sign-up account': { most: 5, windowSeconds: HOUR },
  'sign-up address': { most: 20, windowSeconds: HOUR },
  'reset account': { most: 5, windowSeconds: HOUR },
  'reset address': { most: 20, windowSeconds: HOUR },
  'change-email account': { most: 5, windowSeconds: HOUR },
  'change-email address': { most: 20, windowSeconds: HOUR },
  'password account': { most: 5, windowSeconds: QUARTER_HOUR },
  'mail link account': { most: 5, windowSeconds: QUARTER_HOUR },
  'mail link address': { most: 30, windowSeconds: QUARTER_HOUR },
  'invite account': { most: 40, windowSeconds: HOUR },
  'invite address': { most: 80, windowSeconds: HOUR },
  'invite project': { most: 60, windowSeconds: HOUR },
  'invitation link address': { most: 30, windowSeconds: QUARTER_HOUR },
  // Pages and pictures of share links: a club that opens one together passes, a search for links does not.
  'share address': { most: 300, windowSeconds: QUARTER_HOUR },
  'share columns address': { most: 120, windowSeconds: QUARTER_HOUR },
  'upload account': { most: 300, windowSeconds: HOUR },
  'upload address': { most: 600, windowSeconds: HOUR },
  'archive download account': { most: 60, windowSeconds: HOUR },
  'archive download address': { most: 120, windowSeconds: HOUR },
  'archive import account': { most: 30, windowSeconds: HOUR },
  'archive import address': { most: 60, windowSeconds: HOUR },
} as const

const SHARED_FACTOR = 20

export type LimitName = keyof typeof LIMITS

/** Accounts and addresses are kept as hashes: the counters need to tell them apart, not to know them. */
function limitOf(name: LimitName, who: string | null): Limit {
  const { most, windowSeconds } = LIMITS[name]
  if (who === null) return { key: `${name} shared`, most: most * SHARED_FACTOR, windowSeconds }
  return { key: `${name} ${createHash('sha256').update(who).digest('hex')}`, most, windowSeconds }
}

export function addressLimit(name: LimitName, request: Request): Limit {
  return limitOf(name, askerOf(request.headers))
}

export function accountLimit(name: LimitName, account: string): Limit {
  return limitOf(name, account.toLowerCase())
}

function tooMany(secondsLeft: number, remedy: string): AppError {
  const minutes = Math.max(1, Math.ceil(secondsLeft / 60))
  return new AppError('too-many-attempts', `Too many attempts. Try again in ${minutes} min${remedy}.`, {
    retryAfterSeconds: secondsLeft,
  })
}

/**
 * Counts an attempt and refuses the ones past the limit.
 *
 * @param remedy what can be done instead of waiting, as the end of a sentence: “, or …”
 */
export async function takeAttempt(limit: Limit, remedy = ''): Promise<void> {
  const { isOver, secondsLeft } = await countAttempt(database(), limit)
  if (isOver) throw tooMany(secondsLeft, remedy)
}

/**
 * Counts what is tried before it is looked at, so that guesses made at once find the limit too; what worked was no guess
 * and is taken back.
 */
export async function unlessGuessing<T>(limit: Limit, work: () => Promise<T>, remedy?: string): Promise<T> {
  await takeAttempt(limit, remedy)
  const done = await work()
  await returnAttempt(database(), limit.key)
  return done
}
