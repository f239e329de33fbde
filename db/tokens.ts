import { createHash, randomBytes } from 'node:crypto'

/** 256 random bits, base64url: what a link or a cookie carries. */
export function newToken(): string {
  return randomBytes(32).toString('base64url')
}

/** What a table keeps of a token, in hexadecimal, so that a copy of it opens nothing. */
export function sha256Of(token: string): string {
  return createHash('sha256').update(token).digest('hex')
}
