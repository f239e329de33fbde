import { expect, test, type Page } from '@playwright/test'
import { invitationListSchema } from '@/lib/schemas/people'
import { setMailRefusing, waitForMail } from './support/mail'
import { demoAddress } from './support/demo-project'
import { enterAs } from './support/people'
import { SERVER_ORIGIN } from './support/server'

const subject = /invites you to “Hillside club mount”/

/**
 * An owner of the demo's project invites somebody; the mail follows when the server takes it. Answers the address of the
 * project's invitations.
 */
async function invite(page: Page, email: string): Promise<string> {
  await enterAs(page.context(), 'owner')
  const invitations = `/api${await demoAddress(page)}/invitations`
  const options = { data: { email, role: 'viewer' }, headers: { origin: SERVER_ORIGIN } }
  expect((await page.request.post(invitations, options)).status()).toBe(201)
  return invitations
}

const guest = (name: string) => `${name}.${Date.now()}@hillside.example`

test('a mail is read as it was sent and as text, and its link opens in this tab', async ({ page, request }) => {
  const email = guest('reader')
  await invite(page, email)
  const mail = await waitForMail(request, { to: email, subject })
  await page.goto('/local-mail')
  await page.getByRole('button', { name: email }).click()
  await expect(page.getByRole('heading', { name: subject })).toBeVisible()
  await page.getByText('As text').click()
  await expect(page.getByText('You get this mail because Mira Okafor typed this address')).toBeVisible()
  await expect(page.getByRole('link', { name: mail.links[0] })).toHaveAttribute('href', mail.links[0])
  await page.getByText('As sent').click()
  await page.frameLocator('iframe').getByRole('link', { name: 'See the invitation' }).click()
  await expect(page).toHaveURL(mail.links[0])
  expect(page.context().pages()).toHaveLength(1)
})

test('the mail server fails while somebody is invited, then takes mail again: nothing is lost', async ({
  page,
  request,
}) => {
  const email = guest('patient')
  await page.goto('/local-mail')
  const fails = page.getByRole('checkbox', { name: 'Let the mail server fail' })
  await fails.check()
  await expect(page.getByRole('heading', { level: 1 })).toContainText('the mail server refuses new ones')
  try {
    const address = await invite(page, email)
    await expect(async () => {
      const { invitations } = invitationListSchema.parse(await (await page.request.get(address)).json())
      expect(invitations.find((each) => each.email === email)).toMatchObject({ mail: 'failing', sentAt: null })
    }).toPass({ timeout: 20_000 })
  } finally {
    await setMailRefusing(request, false)
  }
  await waitForMail(request, { to: email, subject })
  await page.goto('/local-mail')
  await expect(fails).not.toBeChecked()
})
