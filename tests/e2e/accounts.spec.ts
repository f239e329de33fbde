import { expect, test, type Browser, type Page } from '@playwright/test'
import { waitForMail } from './support/mail'
import { askToSignUp, localLink, newcomer, signIn, signUp, type Newcomer } from './support/people'

const otherBrowser = async (browser: Browser): Promise<Page> => (await browser.newContext()).newPage()

/** A new account, signed in on this page. */
async function join(page: Page, person: Newcomer): Promise<void> {
  await page.goto('/sign-up')
  await signUp(page, person)
  await expect(page).toHaveURL(/\/projects$/)
}

test('signing up by mail: this page goes on by itself once the link was followed in another tab', async ({ page }) => {
  const person = newcomer()
  await page.goto('/sign-up?next=/projects/new')
  const link = await askToSignUp(page, person)
  await page.getByRole('button', { name: 'Send it again' }).click()
  await expect(page.getByText('Sent again.')).toBeVisible()

  const tab = await page.context().newPage()
  await tab.goto(link)
  await expect(tab).toHaveURL(/\/verify-email$/)
  await expect(tab.getByLabel('Password')).toHaveCount(0)
  await tab.getByRole('button', { name: 'Make my account' }).click()
  await expect(tab).toHaveURL(/\/projects\/new$/)
  await expect(page).toHaveURL(/\/projects\/new$/, { timeout: 15_000 })

  // Signed in, the way in leads on; the link is used up.
  await page.goto('/sign-up')
  await expect(page).toHaveURL(/\/projects$/)
  await page.goto(link)
  await expect(page.getByRole('heading', { level: 1 })).toHaveText('This link opens nothing any more')
})

test('in another browser the link asks for the password that was chosen', async ({ page, browser }) => {
  const person = newcomer('Ebba Norr')
  await page.goto('/sign-up')
  const link = await askToSignUp(page, person)
  const other = await otherBrowser(browser)
  await other.goto(link)
  await expect(other.getByText('Somebody else may have typed your address')).toBeVisible()
  await other.getByLabel('Password').fill('not this one')
  await other.getByRole('button', { name: 'Make my account' }).click()
  await expect(other.getByText('This is not the password that was chosen')).toBeVisible()
  await other.getByLabel('Password').fill(person.password)
  await other.getByRole('button', { name: 'Make my account' }).click()
  await expect(other).toHaveURL(/\/projects$/)
})

test('an address that has an account gets a mail that says so, and the page says the same as ever', async ({
  page,
  browser,
}) => {
  const person = newcomer('Known Already')
  await join(page, person)
  const other = await otherBrowser(browser)
  await other.goto('/sign-up')
  await other.getByLabel('Name', { exact: true }).fill('Somebody')
  await other.getByLabel('E-mail').fill(person.email)
  await other.getByLabel('Password', { exact: true }).fill('some other password')
  await other.getByRole('button', { name: 'Make an account' }).click()
  await expect(other.getByRole('heading', { level: 1 })).toHaveText('Look into your mail')
  await waitForMail(other.request, { to: person.email, subject: 'You have a Turnwright account already' })
  // What was typed is still there for another address.
  await other.getByRole('button', { name: 'Use another address' }).click()
  await expect(other.getByLabel('E-mail')).toHaveValue(person.email)
})

test('after five wrong passwords the sixth is told how long, and a reset by mail lets one in', async ({
  page,
  browser,
}) => {
  const person = newcomer('Wrong Six')
  await join(page, person)
  const other = await otherBrowser(browser)
  await other.goto('/sign-in')
  await other.getByLabel('E-mail').fill(person.email)
  for (let attempt = 1; attempt <= 6; attempt += 1) {
    await other.getByLabel('Password', { exact: true }).fill(`wrong ${attempt}`)
    const answered = other.waitForResponse('**/api/auth/sign-in')
    await other.getByRole('button', { name: 'Sign in' }).click()
    expect((await answered).status()).toBe(attempt <= 5 ? 401 : 429)
  }
  await expect(other.getByText(/Try again in 1[45] min, or set a new password/)).toBeVisible()

  await other.getByRole('link', { name: 'Forgot the password?' }).click()
  await expect(other.getByRole('heading', { level: 1 })).toHaveText('Set a new password by mail')
  await other.getByLabel('E-mail').fill(person.email)
  await other.getByRole('button', { name: 'Send the link' }).click()
  await expect(other.getByText('has an account, a link to set a new password is on its way')).toBeVisible()
  const { links } = await waitForMail(other.request, { to: person.email, subject: 'Set a new password' })
  const link = localLink(links, 'reset-password')
  await other.goto(link)
  await expect(other).toHaveURL(/\/reset-password$/)
  await other.getByLabel('New password').fill('nine quiet turns')
  await other.getByRole('button', { name: 'Set the password' }).click()
  await expect(other).toHaveURL(/\/projects$/)

  await other.goto(link)
  await expect(other.getByText('The link opens nothing any more')).toBeVisible()
  // The session from before has ended.
  await page.goto('/account')
  await expect(page).toHaveURL(/\/sign-in/)
  await signIn(page, { ...person, password: 'nine quiet turns' })
})

test('a new password ends the other session, and sessions end one by one', async ({ page, browser }) => {
  const person = newcomer('Two Places')
  await join(page, person)
  const other = await otherBrowser(browser)
  await signIn(other, person)
  await page.goto('/account')
  const sessions = page.getByRole('region', { name: 'Sessions' })
  await expect(sessions.getByText('You are signed in here and in one other session.')).toBeVisible()
  await sessions.getByRole('button', { name: /^End the session of/ }).click()
  await expect(sessions.getByText('You are signed in here and nowhere else.')).toBeVisible()
  await other.goto('/account')
  await expect(other).toHaveURL(/\/sign-in/)

  await signIn(other, person)
  await page.getByLabel('Present password').fill(person.password)
  await page.getByLabel('New password').fill('ten quiet turns')
  await page.getByRole('button', { name: 'Change the password' }).click()
  await expect(page.getByText('Your password was changed, and your other sessions have ended.')).toBeVisible()
  await other.goto('/account')
  await expect(other).toHaveURL(/\/sign-in/)
  await waitForMail(page.request, { to: person.email, subject: 'Your Turnwright password was changed' })
})

test('an address changes once the link that was sent to the new one is followed', async ({ page }) => {
  const [person, moved] = [newcomer('Moving On'), newcomer('Moved On')]
  await join(page, person)
  await page.goto('/account')
  const section = page.getByRole('region', { name: 'E-mail' })
  await section.getByLabel('New address').fill(moved.email)
  await section.getByLabel('Your password').fill(person.password)
  await section.getByRole('button', { name: 'Change the address' }).click()
  await expect(section.getByText(`A link is on its way to ${moved.email}`)).toBeVisible()
  const { links } = await waitForMail(page.request, { to: moved.email, subject: 'Confirm your new address' })
  await page.goto(localLink(links, 'verify-email'))
  await page.getByRole('button', { name: 'Use this address' }).click()
  await expect(page.getByRole('heading', { level: 1 })).toHaveText('Your address was changed')
  await page.getByRole('link', { name: 'To your account' }).click()
  await expect(page.getByText(`Your address is ${moved.email}`)).toBeVisible()
  await waitForMail(page.request, { to: person.email, subject: 'has a new address' })
})

test('deleting an account names what is lost, and asks for address and password', async ({ page }) => {
  const person = newcomer('Leaving Soon')
  await join(page, person)
  await page.goto('/projects/new')
  await page.getByLabel('Name', { exact: true }).fill('Balcony mount')
  await page.getByRole('button', { name: 'Make the project' }).click()
  await expect(page).toHaveURL(/\/projects\/[0-9a-f-]{36}/)
  await page.goto('/account')
  await page.getByRole('button', { name: 'Delete my account', exact: true }).click()
  const dialog = page.getByRole('dialog', { name: 'Delete your account for good' })
  await expect(dialog.getByText('Balcony mount: nothing recorded in it yet')).toBeVisible()
  await dialog.getByLabel(`Type ${person.email} to confirm`).fill('another@visitor.example')
  await dialog.getByLabel('Your password').fill(person.password)
  await dialog.getByRole('button', { name: 'Delete my account for good' }).click()
  await expect(dialog.getByText('This is not the address of your account')).toBeVisible()
  await dialog.getByLabel(`Type ${person.email} to confirm`).fill(person.email)
  await dialog.getByRole('button', { name: 'Delete my account for good' }).click()
  await expect(page).toHaveURL(/\/$/)
  await expect(page.getByRole('link', { name: 'Sign in' }).first()).toBeVisible()
  await waitForMail(page.request, { to: person.email, subject: 'Your Turnwright account was deleted' })
  await page.goto('/account')
  await expect(page).toHaveURL(/\/sign-in/)
})
