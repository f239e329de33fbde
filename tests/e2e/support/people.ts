import { readFileSync } from 'node:fs'
import { expect, type Browser, type BrowserContext, type Cookie, type Page } from '@playwright/test'
import { z } from 'zod'
import { waitForMail } from './mail'
import { SERVER_ORIGIN } from './server'

const signInsSchema = z.array(
  z.object({
    displayName: z.string(),
    role: z.enum(['owner', 'editor', 'viewer']),
    email: z.string(),
    password: z.string(),
  }),
)
export type DemoPerson = z.infer<typeof signInsSchema>[number]

/** The demo's person with this role, with the password that was made up for the database under test. */
export function demoPerson(role: DemoPerson['role']): DemoPerson {
  const path = process.env.SIGN_INS_FILE
  if (!path) throw new Error('SIGN_INS_FILE must name the file with the demo’s sign-ins')
  const person = signInsSchema.parse(JSON.parse(readFileSync(path, 'utf8'))).find((entry) => entry.role === role)
  if (!person) throw new Error(`The demo has no ${role}`)
  return person
}

export async function signIn(page: Page, { email, password }: Pick<DemoPerson, 'email' | 'password'>): Promise<void> {
  await page.goto('/sign-in')
  await page.getByLabel('E-mail').fill(email)
  await page.getByLabel('Password', { exact: true }).fill(password)
  await page.getByRole('button', { name: 'Sign in' }).click()
  await expect(page).toHaveURL(/\/projects$/)
}

/** Sessions of the demo's people, one each for all tests in this process. */
const sessions = new Map<DemoPerson['role'], Cookie[]>()

/**
 * Lets a browser be signed in as a person of the demo without the form, for tests of something else. Several browsers
 * share the session, so nothing here may end it.
 */
export async function enterAs(context: BrowserContext, role: DemoPerson['role']): Promise<void> {
  const kept = sessions.get(role)
  if (kept) return context.addCookies(kept)
  const { email, password } = demoPerson(role)
  const answer = await context.request.post('/api/auth/sign-in', {
    data: { email, password },
    headers: { origin: SERVER_ORIGIN },
  })
  expect(answer.status(), `sign-in of the demo's ${role}`).toBe(200)
  sessions.set(
    role,
    (await context.cookies()).filter(({ httpOnly }) => httpOnly),
  )
}

/** A browser of its own, signed in as this person of the demo. */
export async function browserOf(browser: Browser, role: DemoPerson['role']): Promise<Page> {
  const context = await browser.newContext()
  await enterAs(context, role)
  return context.newPage()
}

export interface Newcomer {
  displayName: string
  email: string
  password: string
}

let newcomerCount = 0

/** Somebody of this test's own, for whatever ends sessions, uses limits up or deletes. */
export function newcomer(displayName = 'Runa Velde'): Newcomer {
  newcomerCount += 1
  const name = displayName.toLowerCase().replaceAll(' ', '.')
  return {
    displayName,
    email: `${name}.${Date.now()}.${process.pid}.${newcomerCount}@visitor.example`,
    password: 'eight quiet turns',
  }
}

/** Fills and sends the form on the sign-up page, and waits for the link in the mail. */
export async function askToSignUp(page: Page, { displayName, email, password }: Newcomer): Promise<string> {
  await page.getByLabel('Name', { exact: true }).fill(displayName)
  await page.getByLabel('E-mail').fill(email)
  await page.getByLabel('Password', { exact: true }).fill(password)
  await page.getByRole('button', { name: 'Make an account' }).click()
  await expect(page.getByRole('heading', { level: 1 })).toHaveText('Look into your mail')
  const { links } = await waitForMail(page.request, { to: email, subject: 'Confirm your address' })
  return localLink(links, 'verify-email')
}

/** A link of a mail as a path: the server under test may be reached under another address than its mails name. */
export function localLink(links: readonly string[], page: string): string {
  const link = links.find((each) => new URL(each).pathname === `/${page}`)
  if (!link) throw new Error(`The mail has no link to /${page}, only ${links.join(', ')}`)
  const { pathname, search } = new URL(link)
  return pathname + search
}

/** Makes the account with the link of the mail, in another tab; the page that signed up goes on by itself. */
export async function signUp(page: Page, person: Newcomer): Promise<void> {
  const link = await askToSignUp(page, person)
  const tab = await page.context().newPage()
  await tab.goto(link)
  await tab.getByRole('button', { name: 'Make my account' }).click()
  await expect(tab).not.toHaveURL(/verify-email/)
  await tab.close()
  await expect(page).not.toHaveURL(/sign-up/, { timeout: 15_000 })
}
