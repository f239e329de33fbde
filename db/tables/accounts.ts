import type { Generated } from 'kysely'
import type { DisplacementUnit, SwingMeasure, ThemeName } from '@/lib/schemas/preferences'

export interface UsersTable {
  id: Generated<string>
  displayName: string
  /** As typed; unique without regard to case; null once the account is deleted. */
  email: string | null
  emailVerifiedAt: Date | null
  /** Null once the account is deleted. */
  passwordHash: string | null
  createdAt: Generated<Date>
  /** When it was deleted: an empty shell stays, so that what its person made keeps an author. */
  deletedAt: Date | null
  theme: ThemeName | null
  swingMeasure: Generated<SwingMeasure>
  displacementUnit: Generated<DisplacementUnit>
  /** IANA name; null: the browser's. */
  timeZone: string | null
}

export interface SessionsTable {
  /** SHA-256 of the token in the cookie, in hexadecimal. */
  id: string
  /** The name under which a person sees and ends the session. */
  publicId: Generated<string>
  userId: string
  expiresAt: Date
  createdAt: Generated<Date>
  lastSeenAt: Generated<Date>
  userAgent: string | null
}

/** A wish to join whose mail has not been answered yet; no account. */
export interface SignUpsTable {
  id: Generated<string>
  email: string
  displayName: string
  passwordHash: string
  /** SHA-256 of a cookie that the browser which signed up holds; another one must know the password. */
  browserSha256: string
  /** SHA-256 of the token in the mail; null until the mail has been written. */
  tokenSha256: string | null
  /** Where to go on afterwards; a path of ours. */
  nextPath: string | null
  createdAt: Generated<Date>
  expiresAt: Date
}

export interface EmailTokensTable {
  /** SHA-256 of the token in the mail, in hexadecimal. */
  id: string
  userId: string
  purpose: 'reset-password' | 'change-email'
  /** The address it was sent to; for 'change-email' the one to change to. */
  email: string
  expiresAt: Date
  createdAt: Generated<Date>
}

export interface RateLimitsTable {
  key: string
  hits: number
  expiresAt: Date
}
