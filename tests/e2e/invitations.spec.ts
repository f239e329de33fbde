import { expect, test, type Browser, type Page } from '@playwright/test'
import { letInvitationsExpire } from './support/database'
import { setMailRefusing } from './support/mail'
import { browserOf, demoPerson } from './support/people'
import { joinWithoutAccount, newAddress, ownersPeople } from './support/people-page'

async function freshPage(browser: Browser): Promise<Page> {
  return (await browser.newContext()).newPage()
}

test('a link that was used, replaced or revoked says so, and what to do', async ({ browser }) => {
  const owner = await ownersPeople(browser, 'Ended links mount')
  const title = (page: Page) => page.getByRole('heading', { level: 1 })
  const visitor = await freshPage(browser)

  const used = newAddress('used')
  await owner.invite(used, 'viewer')
  const usedLink = await owner.linkFor(used)
  await joinWithoutAccount(visitor, usedLink, 'Una Used')
  await visitor.goto(usedLink)
  await expect(title(visitor)).toHaveText(`You are in “${owner.project.name}” already, as a viewer`)
  const other = await freshPage(browser)
  await other.goto(usedLink)
  await expect(title(other)).toHaveText('This invitation has been used')

  const replaced = newAddress('replaced')
  await owner.invite(replaced, 'viewer')
  const oldLink = await owner.linkFor(replaced)
  await expect(owner.invitation(replaced)).toContainText(/sent \d+/)
  const since = new Date()
  await owner.page.getByRole('button', { name: `Send again to ${replaced}` }).click()
  await expect(owner.page.getByText(`A new mail to ${replaced} is on its way`)).toBeVisible()
  const newLink = await owner.linkFor(replaced, since)
  expect(newLink).not.toBe(oldLink)
  await other.goto(oldLink)
  await expect(title(other)).toHaveText('A newer mail has replaced this link')
  await other.goto(newLink)
  await expect(title(other)).toContainText('invites you to')

  await owner.page.getByRole('button', { name: `Revoke the invitation of ${replaced}` }).click()
  await owner.page.getByRole('dialog').getByRole('button', { name: 'Revoke' }).click()
  await expect(owner.invitation(replaced)).toHaveCount(0)
  // The page was open before the owner revoked it.
  await other.getByLabel('Name', { exact: true }).fill('Late Comer')
  await other.getByLabel('Password', { exact: true }).fill('a quiet evening')
  await other.getByRole('button', { name: 'Make the account and join' }).click()
  await expect(other.getByText('This invitation was taken back')).toBeVisible()
  await other.goto(newLink)
  await expect(title(other)).toHaveText('This invitation was taken back')
  const response = await other.goto('/invite/no-such-token')
  await expect(title(other)).toHaveText('This link opens nothing')
  expect(response?.headers()).toMatchObject({
    'referrer-policy': 'no-referrer',
    'x-robots-tag': 'noindex, nofollow, noarchive',
  })
})

test('an invitation that has expired lets nobody in until it is sent again', async ({ browser }) => {
  const owner = await ownersPeople(browser, 'Expired link mount')
  const email = newAddress('late')
  await owner.invite(email, 'editor')
  const link = await owner.linkFor(email)
  const guest = await freshPage(browser)
  await guest.goto(link)
  await expect(guest.getByRole('button', { name: 'Make the account and join' })).toBeVisible()
  await letInvitationsExpire(email)
  // The page was open before the time ran out.
  await guest.getByLabel('Name', { exact: true }).fill('Lars Late')
  await guest.getByLabel('Password', { exact: true }).fill('a quiet evening')
  await guest.getByRole('button', { name: 'Make the account and join' }).click()
  await expect(guest.getByText('This invitation has expired')).toBeVisible()
  await guest.goto(link)
  await expect(guest.getByRole('heading', { level: 1 })).toHaveText('This invitation has expired')

  await owner.open()
  await expect(owner.invitation(email)).toContainText('expired')
  const since = new Date()
  await owner.page.getByRole('button', { name: `Send again to ${email}` }).click()
  await joinWithoutAccount(guest, await owner.linkFor(email, since), 'Lars Late')
  expect(new URL(guest.url()).pathname).toBe(owner.project.address)
})

test('an address that waits already, or is here, is not invited twice', async ({ browser }) => {
  const owner = await ownersPeople(browser, 'Twice mount')
  const email = newAddress('twice')
  await owner.invite(email, 'viewer')
  await owner.page.getByLabel('E-mail').fill(email.toUpperCase())
  await owner.page.getByRole('button', { name: 'Send the invitation' }).click()
  await expect(owner.page.getByText(`${email} was invited already`)).toBeVisible()
  await owner.page.getByRole('button', { name: 'Send it again' }).click()
  await expect(owner.page.getByText(`${email} is invited as viewer.`)).toBeVisible()
  await owner.page.getByLabel('E-mail').fill(demoPerson('owner').email)
  await owner.page.getByRole('button', { name: 'Send the invitation' }).click()
  await expect(owner.page.getByText('This is your own address')).toBeVisible()
  await expect(owner.page.getByLabel('E-mail')).toHaveValue(demoPerson('owner').email)
})

test('somebody signed in with another address is told both, and may join', async ({ browser }) => {
  const owner = await ownersPeople(browser, 'Other address mount')
  const email = newAddress('other')
  await owner.invite(email, 'editor')
  const editor = demoPerson('editor')
  const page = await browserOf(browser, 'editor')
  await page.goto(await owner.linkFor(email))
  const notice = page.getByText('The invitation was sent to')
  await expect(notice).toContainText(email)
  await expect(notice).toContainText(editor.email)
  await page.getByRole('button', { name: `Join as ${editor.displayName}` }).click()
  await expect(page).toHaveURL(new RegExp(`${owner.project.address}$`))
})

test('an invitation survives a mail server that is down', async ({ browser }) => {
  const owner = await ownersPeople(browser, 'Mail is down mount')
  const email = newAddress('patient')
  await setMailRefusing(owner.page.request, true)
  try {
    await owner.invite(email, 'editor')
    await expect(owner.invitation(email)).toContainText('is sent again by itself')
  } finally {
    await setMailRefusing(owner.page.request, false)
  }
  const link = await owner.linkFor(email)
  await expect(owner.invitation(email)).toContainText(/sent \d+/)
  await joinWithoutAccount(await freshPage(browser), link, 'Pia Patient')
})

test('roles change, people go, and an open page says so; the last owner stays', async ({ browser }) => {
  const owner = await ownersPeople(browser, 'Changing people mount')
  const email = newAddress('mo')
  await owner.invite(email, 'viewer')
  const guest = await freshPage(browser)
  await joinWithoutAccount(guest, await owner.linkFor(email), 'Mo Member')
  await owner.open()
  const dialog = owner.page.getByRole('dialog')

  await owner.member('Mo Member').getByRole('combobox').selectOption('editor')
  await expect(dialog).toContainText('Mo Member may from then on also bring in runs')
  await dialog.getByRole('button', { name: 'Make an editor' }).click()
  await expect(owner.member('Mo Member').getByRole('combobox')).toHaveValue('editor')
  await guest.goto(`${owner.project.address}/drive`)
  await guest.getByLabel('Teeth of the worm wheel').fill('160')

  const self = demoPerson('owner').displayName
  await owner.member(self).getByRole('button', { name: 'Leave' }).click()
  await expect(dialog).toContainText('Make somebody else an owner first')
  await dialog.getByRole('button', { name: 'Close' }).click()

  await owner.page.getByRole('button', { name: 'Remove Mo Member' }).click()
  await expect(dialog).toContainText('Share links that they made go on working')
  await dialog.getByRole('button', { name: 'Remove' }).click()
  await expect(owner.member('Mo Member')).toHaveCount(0)

  await guest.getByRole('button', { name: 'Save the drive train' }).click()
  await expect(guest.getByText('This project is not there any more')).toBeVisible()
  await expect(guest.getByLabel('Teeth of the worm wheel')).toHaveValue('160')
  expect((await guest.goto(owner.project.address))?.status()).toBe(404)
})

test('an editor leaves a project', async ({ browser }) => {
  const owner = await ownersPeople(browser, 'Leaving mount')
  const email = newAddress('lea')
  await owner.invite(email, 'editor')
  const page = await freshPage(browser)
  await joinWithoutAccount(page, await owner.linkFor(email), 'Lea Leaving')
  await page.goto(`${owner.project.address}/people`)
  await page.getByRole('button', { name: 'Leave' }).click()
  await page.getByRole('dialog').getByRole('button', { name: 'Leave' }).click()
  await expect(page).toHaveURL(/\/projects$/)
  await expect(page.getByText(owner.project.name)).toHaveCount(0)
})
