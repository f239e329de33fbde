import { expect } from 'vitest'
import { database } from '@/db'
import { insertUser } from '@/db/queries/users'
import { openSession, SESSION_COOKIE } from '@/lib/server/auth'
import { hashPassword } from '@/lib/server/passwords'

// Vitest sets it to '/' for its own purposes; the tests stand for a server without a fixed address.
process.env.BASE_URL = ''

export const OWN_ORIGIN = 'http://localhost:3000'
export const PASSWORD = 'a long enough password'

export interface Asker {
  /** Cookie header; undefined: no session. */
  cookie?: string
}

export interface Call extends Asker {
  method?: string
  /** Sent as JSON unless it is bytes or a stream. */
  body?: unknown
  headers?: Record<string, string>
  /** null: none is sent. */
  origin?: string | null
}

function isRaw(body: unknown): body is Uint8Array<ArrayBuffer> | ReadableStream {
  return body instanceof Uint8Array || body instanceof ReadableStream
}

/** A request as the server would get it from a browser that shows one of our pages. */
export function makeRequest(path: string, { method = 'GET', body, headers, cookie, origin }: Call = {}): Request {
  const all = new Headers({ host: 'localhost:3000', ...headers })
  if (cookie) all.set('cookie', cookie)
  if (origin !== null && method !== 'GET') all.set('origin', origin ?? OWN_ORIGIN)
  const init: RequestInit & { duplex?: 'half' } = { method, headers: all }
  if (body !== undefined) {
    init.body = isRaw(body) ? body : JSON.stringify(body)
    init.duplex = 'half'
  }
  return new Request(`${OWN_ORIGIN}${path}`, init)
}

type Handler = (request: Request, context: { params: Promise<never> }) => Promise<Response>

/** Calls a handler of app/api directly, with the parts of its address. */
export function call(handler: unknown, path: string, params: Record<string, string> = {}, options: Call = {}) {
  return (handler as Handler)(makeRequest(path, options), { params: Promise.resolve(params as never) })
}

/** The cookie that an answer sets, in the form in which a browser sends it back. */
export function cookieOf(response: Response): string {
  const [pair] = (response.headers.get('set-cookie') ?? '').split(';')
  expect(pair).toMatch(new RegExp(`^${SESSION_COOKIE}=.`))
  return pair
}

export interface Person extends Asker {
  id: string
  cookie: string
  displayName: string
  email: string
}

/** An account whose address has been proven. */
export async function makeAccount({ password, ...fields }: { displayName: string; email: string; password: string }) {
  const user = await insertUser(database(), { ...fields, passwordHash: await hashPassword(password) })
  if (!user) throw new Error(`There is an account for ${fields.email} already`)
  return user
}

let counter = 0

/** A new account with an open session. */
export async function signUpPerson(displayName: string): Promise<Person> {
  counter += 1
  const email = `${displayName.toLowerCase().replaceAll(' ', '.')}.${counter}@example.org`
  const user = await makeAccount({ displayName, email, password: PASSWORD })
  const [cookie] = (await openSession(makeRequest('/'), user.id)).split(';')
  return { id: user.id, cookie, displayName, email }
}
