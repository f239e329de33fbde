import { readFileSync } from 'node:fs'
import { expect, type Page } from '@playwright/test'
import { z } from 'zod'

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
