import type { Generated } from 'kysely'

export interface UsersTable {
  id: Generated<string>
  displayName: string
  /** As typed; unique without regard to case. */
  email: string
  emailVerifiedAt: Date | null
  passwordHash: string
  createdAt: Generated<Date>
}

export interface SessionsTable {
  /** SHA-256 of the token in the cookie, in hexadecimal. */
  id: string
  userId: string
  expiresAt: Date
  createdAt: Generated<Date>
  userAgent: string | null
}

export interface EmailTokensTable {
  /** SHA-256 of the token in the mail, in hexadecimal. */
  id: string
  userId: string
  purpose: 'verify-email' | 'reset-password'
  email: string
  expiresAt: Date
  createdAt: Generated<Date>
}

export interface RateLimitsTable {
  key: string
  hits: number
  expiresAt: Date
}
