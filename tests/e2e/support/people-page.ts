import { expect, type Browser, type Locator, type Page } from '@playwright/test'
import { waitForMail } from './mail'
import { makeOwnProject } from './own-project'
import { browserOf } from './people'

/** The People screen of a project as its owner uses it. */
export class PeoplePage {
  constructor(
    readonly page: Page,
    readonly project: { name: string; address: string },
  ) {}

  async open(): Promise<void> {
    await this.page.goto(`${this.project.address}/people`)
    await expect(this.page.getByRole('table', { name: 'people' })).toBeVisible()
  }

  member(name: string): Locator {
    return this.page.getByRole('table', { name: 'people' }).getByRole('row').filter({ hasText: name })
  }

  invitation(email: string): Locator {
    return this.page.getByRole('table', { name: 'invitations' }).getByRole('row').filter({ hasText: email })
  }

  async invite(email: string, role: 'viewer' | 'editor' | 'owner'): Promise<void> {
    await this.page.getByLabel('E-mail').fill(email)
    await this.page.getByLabel('Role', { exact: true }).selectOption(role)
    await this.page.getByRole('button', { name: 'Send the invitation' }).click()
    await expect(this.page.getByText(`${email} is invited as ${role}.`)).toBeVisible()
  }

  /** The link in the newest mail to this address, about this project. */
  async linkFor(email: string, since?: Date): Promise<string> {
    const mail = await waitForMail(this.page.request, { to: email, subject: this.project.name, since })
    const link = mail.links.find((address) => address.includes('/invite/'))
    if (!link) throw new Error('The mail holds no link of an invitation')
    return new URL(link).pathname
  }
}

/** The demo's owner on the People screen of a project of their own. */
export async function ownersPeople(browser: Browser, purpose: string): Promise<PeoplePage> {
  const page = await browserOf(browser, 'owner')
  const people = new PeoplePage(page, await makeOwnProject(page, purpose))
  await people.open()
  return people
}

/** An address that nobody has been invited at. */
export const newAddress = (name: string) => `${name}.${Date.now()}@hillside.example`

/** Makes the account that an invitation asks for, and ends in the project. */
export async function joinWithoutAccount(page: Page, link: string, name: string): Promise<void> {
  await page.goto(link)
  await page.getByLabel('Name', { exact: true }).fill(name)
  await page.getByLabel('Password', { exact: true }).fill('a quiet evening')
  await page.getByRole('button', { name: 'Make the account and join' }).click()
  await expect(page).toHaveURL(/\/projects\/[0-9a-f-]{36}$/)
}
