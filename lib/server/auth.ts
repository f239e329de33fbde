import 'server-only'
import { NodePostgresAdapter } from '@lucia-auth/adapter-postgresql'
import { Lucia, TimeSpan } from 'lucia'
import { database, databasePool } from '@/db'
import { insertSession, touchSession } from '@/db/queries/sessions'
import { lockUser } from '@/db/queries/users'
import { newToken, sha256Of } from '@/db/tokens'
import type { DisplacementUnit, Preferences, SwingMeasure, ThemeName } from '@/lib/schemas/preferences'
import { environment } from './environment'
import { notSignedIn, wrongCredentials } from './errors'

declare module 'lucia' {
  interface Register {
    Lucia: ReturnType<typeof createLucia>
    DatabaseUserAttributes: {
      display_name: string
      /** Null: the account was deleted. */
      email: string | null
      theme: ThemeName | null
      swing_measure: SwingMeasure
      displacement_unit: DisplacementUnit
      time_zone: string | null
    }
    DatabaseSessionAttributes: { user_agent: string | null; last_seen_at: Date }
  }
}

export interface SignedInUser {
  id: string
  displayName: string
  email: string
  preferences: Preferences
}

export const SESSION_COOKIE = 'turnwright_session'

/** Attributes of every cookie of ours that opens something. */
export function cookieAttributes() {
  return { sameSite: 'lax', path: '/', secure: environment().baseOrigin?.startsWith('https:') ?? false } as const
}

/** Counted anew whenever the session is used in the second half of them. */
const SESSION_DAYS = 30

/** A session that is used is noted at most this often, so that reading pages does not write each time. */
const SEEN_EVERY_MS = 5 * 60_000

/**
 * The cookie has no expiry of its own that matters (`expires: false`): Lucia extends the row even while a page renders,
 * where no cookie can be set, so a cookie that ran out would sign active people out.
 */
function createLucia() {
  const adapter = new NodePostgresAdapter(databasePool(), { user: 'users', session: 'sessions' })
  return new Lucia(adapter, {
    sessionExpiresIn: new TimeSpan(SESSION_DAYS, 'd'),
    sessionCookie: {
      name: SESSION_COOKIE,
      expires: false,
      attributes: cookieAttributes(),
    },
    getSessionAttributes: ({ last_seen_at }) => ({ lastSeenAt: last_seen_at }),
    getUserAttributes: ({ display_name, email, theme, swing_measure, displacement_unit, time_zone }) => ({
      displayName: display_name,
      email,
      preferences: {
        theme,
        swingMeasure: swing_measure,
        displacementUnit: displacement_unit,
        timeZone: time_zone,
      },
    }),
  })
}

let cached: ReturnType<typeof createLucia> | undefined

function lucia() {
  cached ??= createLucia()
  return cached
}

/** The person whose session this token opens, or null. */
export async function validateToken(token: string | null | undefined): Promise<SignedInUser | null> {
  if (!token) return null
  const { user, session } = await lucia().validateSession(sha256Of(token))
  if (session && Date.now() - session.lastSeenAt.getTime() > SEEN_EVERY_MS) await touchSession(database(), session.id)
  if (!user?.email) return null
  return { id: user.id, displayName: user.displayName, email: user.email, preferences: user.preferences }
}

function tokenOf(request: Request): string | null {
  return lucia().readSessionCookie(request.headers.get('cookie') ?? '')
}

/** The key of the session that a request carries, or claims to carry; null without one. */
export function sessionIdOf(request: Request): string | null {
  const token = tokenOf(request)
  return token ? sha256Of(token) : null
}

export function validateRequest(request: Request): Promise<SignedInUser | null> {
  return validateToken(tokenOf(request))
}

/** @throws {AppError} not-signed-in */
export async function requireUser(request: Request): Promise<SignedInUser> {
  const user = await validateRequest(request)
  if (!user) throw notSignedIn()
  return user
}

/**
 * Opens a session, and sweeps out the expired ones; the answer is the Set-Cookie header that carries its token.
 *
 * @param provenHash what the given password was compared with: whoever changes it ends all sessions, and one that opens at
 *   the same moment must not outlive that
 * @throws {AppError} wrong-credentials once the account has another password or is gone
 */
export async function openSession(request: Request, userId: string, provenHash?: string): Promise<string> {
  const token = newToken()
  await lucia().deleteExpiredSessions()
  const userAgent = request.headers.get('user-agent')?.slice(0, 300) ?? null
  await database()
    .transaction()
    .execute(async (trx) => {
      const user = await lockUser(trx, userId)
      if (!user || (provenHash !== undefined && user.passwordHash !== provenHash)) throw wrongCredentials()
      await insertSession(trx, { id: sha256Of(token), userId, userAgent, validDays: SESSION_DAYS })
    })
  return lucia().createSessionCookie(token).serialize()
}

/** Ends the request's session, if it has one; the answer is the Set-Cookie header that removes the cookie. */
export async function closeSession(request: Request): Promise<string> {
  const token = tokenOf(request)
  if (token) await lucia().invalidateSession(sha256Of(token))
  return lucia().createBlankSessionCookie().serialize()
}
