import { describe, expect, test } from 'vitest'
import * as account from '@/app/api/account/route'
import * as deletion from '@/app/api/account/deletion/route'
import * as accountEmail from '@/app/api/account/email/route'
import * as accountPassword from '@/app/api/account/password/route'
import * as preferences from '@/app/api/account/preferences/route'
import * as sessions from '@/app/api/account/sessions/route'
import * as session from '@/app/api/account/sessions/[sessionId]/route'
import * as reset from '@/app/api/auth/reset-password/route'
import * as askReset from '@/app/api/auth/reset-password/ask/route'
import * as signIn from '@/app/api/auth/sign-in/route'
import * as signOut from '@/app/api/auth/sign-out/route'
import * as signUp from '@/app/api/auth/sign-up/route'
import * as verify from '@/app/api/auth/verify-email/route'
import * as health from '@/app/api/health/route'
import * as acceptInvitation from '@/app/api/invitations/accept/route'
import * as invitationSignUp from '@/app/api/invitations/sign-up/route'
import * as localMails from '@/app/api/local-mail/route'
import * as localMail from '@/app/api/local-mail/[mailName]/route'
import * as localMailHtml from '@/app/api/local-mail/[mailName]/html/route'
import * as localMailRefusing from '@/app/api/local-mail/refusing/route'
import * as me from '@/app/api/me/route'
import * as projects from '@/app/api/projects/route'
import * as projectImport from '@/app/api/projects/import/route'
import * as share from '@/app/api/share/[token]/route'
import * as shareColumns from '@/app/api/share/[token]/columns/route'
import { openTestDatabase } from '../support/test-database'
import { DRIVE_TRAIN } from '../support/test-project'
import { call, PASSWORD, signUpPerson, type Person } from '../support/test-server'

openTestDatabase()

type Method = 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE'

interface Case {
  method: Method
  module: Partial<Record<Method, unknown>>
  /** Expected without a session, and with one. */
  none: number
  signedIn: number
  params?: Record<string, string>
  /** Of a signed-in person the body may name the address; without a session it is nobody's. */
  body?: (email: string) => unknown
}

const UNKNOWN_ID = '5f0c0b9e-7d3c-4a58-9f0a-3d2f6b1c9e11'
const form = { displayName: 'Runa Velde', password: PASSWORD }

/** Whoever asks may; what then happens depends on what is asked. */
const forAnyone = (status: number) => ({ none: status, signedIn: status })
const forSignedIn = (status: number) => ({ none: 401, signedIn: status })

/** The local mail exists only beside the mail server of our own, which no server in these tests has. */
const NO_LOCAL_MAIL = forAnyone(404)

const cases: [string, Case][] = [
  ['PATCH account', { method: 'PATCH', module: account, ...forSignedIn(200), body: () => form }],
  [
    'DELETE account',
    { method: 'DELETE', module: account, ...forSignedIn(204), body: (email) => ({ email, password: PASSWORD }) },
  ],
  ['GET account/deletion', { method: 'GET', module: deletion, ...forSignedIn(200) }],
  [
    'POST account/email',
    {
      method: 'POST',
      module: accountEmail,
      ...forSignedIn(202),
      body: () => ({ email: 'to@example.org', password: PASSWORD }),
    },
  ],
  [
    'POST account/password',
    {
      method: 'POST',
      module: accountPassword,
      ...forSignedIn(204),
      body: () => ({ password: PASSWORD, newPassword: PASSWORD }),
    },
  ],
  [
    'PATCH account/preferences',
    { method: 'PATCH', module: preferences, ...forSignedIn(200), body: () => ({ theme: 'dusk' }) },
  ],
  ['GET account/sessions', { method: 'GET', module: sessions, ...forSignedIn(200) }],
  ['DELETE account/sessions', { method: 'DELETE', module: sessions, ...forSignedIn(204) }],
  [
    'DELETE account/sessions/…',
    { method: 'DELETE', module: session, ...forSignedIn(404), params: { sessionId: UNKNOWN_ID } },
  ],
  [
    'POST auth/reset-password',
    { method: 'POST', module: reset, ...forAnyone(410), body: () => ({ token: 'unknown', password: PASSWORD }) },
  ],
  [
    'POST auth/reset-password/ask',
    { method: 'POST', module: askReset, ...forAnyone(202), body: (email) => ({ email }) },
  ],
  [
    'POST auth/sign-in',
    { method: 'POST', module: signIn, none: 401, signedIn: 200, body: (email) => ({ email, password: PASSWORD }) },
  ],
  ['POST auth/sign-out', { method: 'POST', module: signOut, ...forAnyone(204) }],
  ['POST auth/sign-up', { method: 'POST', module: signUp, ...forAnyone(202), body: (email) => ({ ...form, email }) }],
  ['POST auth/verify-email', { method: 'POST', module: verify, ...forAnyone(410), body: () => ({ token: 'unknown' }) }],
  ['GET health', { method: 'GET', module: health, ...forAnyone(200) }],
  [
    'POST invitations/accept',
    { method: 'POST', module: acceptInvitation, ...forSignedIn(404), body: () => ({ token: 'unknown' }) },
  ],
  [
    'POST invitations/sign-up',
    { method: 'POST', module: invitationSignUp, ...forAnyone(404), body: () => ({ ...form, token: 'unknown' }) },
  ],
  ['GET local-mail', { method: 'GET', module: localMails, ...NO_LOCAL_MAIL }],
  ['DELETE local-mail', { method: 'DELETE', module: localMails, ...NO_LOCAL_MAIL }],
  ['GET local-mail/…', { method: 'GET', module: localMail, ...NO_LOCAL_MAIL, params: { mailName: 'none' } }],
  ['GET local-mail/…/html', { method: 'GET', module: localMailHtml, ...NO_LOCAL_MAIL, params: { mailName: 'none' } }],
  [
    'PUT local-mail/refusing',
    { method: 'PUT', module: localMailRefusing, ...NO_LOCAL_MAIL, body: () => ({ isRefusing: true }) },
  ],
  ['GET me', { method: 'GET', module: me, ...forAnyone(200) }],
  ['GET projects', { method: 'GET', module: projects, ...forSignedIn(200) }],
  [
    'POST projects',
    { method: 'POST', module: projects, ...forSignedIn(201), body: () => ({ name: 'M', driveTrain: DRIVE_TRAIN }) },
  ],
  // An empty body is no archive.
  ['POST projects/import', { method: 'POST', module: projectImport, ...forSignedIn(422) }],
  // Whoever holds the link reads what it shares; this one is nobody’s.
  ['GET share/…', { method: 'GET', module: share, ...forAnyone(404), params: { token: 'unknown' } }],
  ['GET share/…/columns', { method: 'GET', module: shareColumns, ...forAnyone(404), params: { token: 'unknown' } }],
]

function ask({ method, module, params, body }: Case, person: Person | null, origin?: string | null) {
  const options = { method, body: body?.(person?.email ?? 'nobody@example.org'), cookie: person?.cookie, origin }
  return call(module[method], '/', params, options)
}

describe.each(cases)('%s', (_, item) => {
  test('without a session', async () => {
    expect((await ask(item, null)).status).toBe(item.none)
  })

  test('signed in', async () => {
    expect((await ask(item, await signUpPerson('Any One'))).status).toBe(item.signedIn)
  })

  if (item.method !== 'GET') {
    test('from a page of another site is refused before anything else', async () => {
      const person = await signUpPerson('Careful')
      for (const asker of [null, person]) {
        for (const origin of [null, 'null', 'https://elsewhere.example']) {
          const response = await ask(item, asker, origin)
          expect([response.status, (await response.json()).error.code]).toEqual([403, 'wrong-origin'])
          expect(response.headers.get('set-cookie')).toBeNull()
        }
      }
      // Nothing of it was done.
      const { user } = await (await call(me.GET, '/api/me', {}, person)).json()
      expect(user).toMatchObject({ displayName: 'Careful', email: person.email })
    })
  }
})

test('every handler that is not below a project stands in the table above', async () => {
  const modules = import.meta.glob(['../../app/api/**/route.ts', '!../../app/api/projects/[[]projectId[]]/**'])
  const listed = new Set<unknown>(cases.map(([, { module, method }]) => module[method]))
  expect(Object.keys(modules).length).toBeGreaterThan(15)
  for (const [path, load] of Object.entries(modules)) {
    for (const [name, handler] of Object.entries((await load()) as object)) {
      if (/^[A-Z]+$/.test(name)) expect(listed.has(handler), `${name} of ${path}`).toBe(true)
    }
  }
})
