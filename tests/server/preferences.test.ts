import { expect, test } from 'vitest'
import { PATCH as change } from '@/app/api/account/preferences/route'
import { POST as signIn } from '@/app/api/auth/sign-in/route'
import { GET as me } from '@/app/api/me/route'
import { DEFAULT_PREFERENCES } from '@/lib/schemas/preferences'
import { openTestDatabase } from '../support/test-database'
import { call, PASSWORD, signUpPerson } from '../support/test-server'

const database = openTestDatabase()

const patch = (body: unknown, cookie?: string) =>
  call(change, '/api/account/preferences', {}, { method: 'PATCH', body, cookie })

async function preferencesOf(cookie: string) {
  return (await (await call(me, '/api/me', {}, { cookie })).json()).user.preferences
}

test('what is named changes, the rest stays, and only for the person who asked', async () => {
  const ines = await signUpPerson('Ines')
  const otto = await signUpPerson('Otto')
  const response = await patch({ swingMeasure: 'peak-to-peak', timeZone: 'Pacific/Auckland' }, ines.cookie)
  expect(response.status).toBe(200)
  const wanted = { ...DEFAULT_PREFERENCES, swingMeasure: 'peak-to-peak', timeZone: 'Pacific/Auckland' }
  expect(await response.json()).toEqual(wanted)
  expect(await preferencesOf(ines.cookie)).toEqual(wanted)
  expect(await preferencesOf(otto.cookie)).toEqual(DEFAULT_PREFERENCES)
  await patch({ timeZone: null, displacementUnit: 'px' }, ines.cookie)
  expect(await preferencesOf(ines.cookie)).toEqual({ ...wanted, timeZone: null, displacementUnit: 'px' })
})

test('a change is told in the account’s history, a theme alone is not', async () => {
  const { cookie, email } = await signUpPerson('Vera')
  const events = () =>
    database.db
      .selectFrom('auditEvents')
      .select('action')
      .where('subject', '=', email)
      .where('action', '=', 'account.preferences')
      .execute()
  await patch({ theme: 'night' }, cookie)
  expect(await events()).toHaveLength(0)
  await patch({ theme: 'day', swingMeasure: 'peak-to-peak' }, cookie)
  expect(await events()).toHaveLength(1)
})

test.each([
  ['nothing at all', {}, 422],
  ['an unknown theme', { theme: 'dawn' }, 422],
  ['an unknown measure', { swingMeasure: 'rms' }, 422],
  ['an unknown unit', { displacementUnit: 'mm' }, 422],
  ['a zone that there is not', { timeZone: 'Moon/Tycho' }, 422],
  ['only what is no preference', { id: '00000000-0000-4000-8000-000000000000' }, 422],
])('%s is refused', async (_, body, status) => {
  const { cookie } = await signUpPerson('Nils')
  expect((await patch(body, cookie)).status).toBe(status)
  expect(await preferencesOf(cookie)).toEqual(DEFAULT_PREFERENCES)
})

test('without a session it is 401', async () => {
  expect((await patch({ theme: 'night' })).status).toBe(401)
})

test('signing in brings the theme of the account along; an account without one leaves the browser’s alone', async () => {
  const { cookie, email } = await signUpPerson('Tore')
  const signInAgain = async () => {
    const response = await call(signIn, '/', {}, { method: 'POST', body: { email, password: PASSWORD } })
    return response.headers.getSetCookie().filter((each) => each.startsWith('theme='))
  }
  expect(await signInAgain()).toEqual([])
  await patch({ theme: 'night' }, cookie)
  expect(await signInAgain()).toEqual([expect.stringMatching(/^theme=night; Path=\/; Max-Age=31536000; SameSite=Lax$/)])
  await patch({ theme: null }, cookie)
  expect(await signInAgain()).toEqual([])
})
