import { expect, type Locator, type Page } from '@playwright/test'
import { waitForMail } from './mail'

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
