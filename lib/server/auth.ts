import 'server-only'
import { createHash, randomBytes } from 'node:crypto'
import { NodePostgresAdapter } from '@lucia-auth/adapter-postgresql'
import { Lucia, TimeSpan } from 'lucia'
import { databasePool } from '@/db'
import { environment } from './environment'
import { notSignedIn } from './errors'

declare module 'lucia' {
  interface Register {
    Lucia: ReturnType<typeof createLucia>
    DatabaseUserAttributes: { display_name: string; email: string }
    DatabaseSessionAttributes: { user_agent: string | null }
  }
}

export interface SignedInUser {
  id: string
  displayName: string
  email: string
}

export const SESSION_COOKIE = 'turnwright_session'

/**
 * The cookie has no expiry of its own that matters (`expires: false`): Lucia extends the row even while a page renders,
 * where no cookie can be set, so a cookie that ran out would sign active people out.
 */
function createLucia() {
  const adapter = new NodePostgresAdapter(databasePool(), { user: 'users', session: 'sessions' })
  return new Lucia(adapter, {
    sessionExpiresIn: new TimeSpan(30, 'd'),
    sessionCookie: {
      name: SESSION_COOKIE,
      expires: false,
      attributes: { sameSite: 'lax', path: '/', secure: environment().baseOrigin?.startsWith('https:') ?? false },
    },
    getUserAttributes: ({ display_name, email }) => ({ displayName: display_name, email }),
  })
}

let cached: ReturnType<typeof createLucia> | undefined

function lucia() {
  cached ??= createLucia()
  return cached
}

/** What the table keeps of a token: its SHA-256, so that a copy of the table opens no session. */
function sessionIdOf(token: string): string {
  return createHash('sha256').update(token).digest('hex')
}

/** The person whose session this token opens, or null. */
export async function validateToken(token: string | null | undefined): Promise<SignedInUser | null> {
  if (!token) return null
  const { user } = await lucia().validateSession(sessionIdOf(token))
  return user && { id: user.id, displayName: user.displayName, email: user.email }
}

function tokenOf(request: Request): string | null {
  return lucia().readSessionCookie(request.headers.get('cookie') ?? '')
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

/** Opens a session, and sweeps out the expired ones; the answer is the Set-Cookie header that carries its token. */
export async function openSession(request: Request, userId: string): Promise<string> {
  const token = randomBytes(32).toString('base64url')
  await lucia().deleteExpiredSessions()
  const userAgent = request.headers.get('user-agent')?.slice(0, 300) ?? null
  await lucia().createSession(userId, { user_agent: userAgent }, { sessionId: sessionIdOf(token) })
  return lucia().createSessionCookie(token).serialize()
}

/** Ends the request's session, if it has one; the answer is the Set-Cookie header that removes the cookie. */
export async function closeSession(request: Request): Promise<string> {
  const token = tokenOf(request)
  if (token) await lucia().invalidateSession(sessionIdOf(token))
  return lucia().createBlankSessionCookie().serialize()
}
