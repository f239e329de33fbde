import { expect, test, type Browser, type Page } from '@playwright/test'
import { visitorRecording } from './fixtures/recordings'
import { BenchPage } from './support/bench-page'
import { demoPerson, newcomer, signIn, signUp, type DemoPerson } from './support/people'

const HILLSIDE = 'Hillside club mount'

async function pageOf(browser: Browser, role: DemoPerson['role']): Promise<Page> {
  const page = await (await browser.newContext()).newPage()
  await signIn(page, demoPerson(role))
  return page
}

async function openProject(page: Page, subPath = ''): Promise<string> {
  await page.goto('/projects')
  const address = await page.getByRole('link', { name: HILLSIDE }).first().getAttribute('href')
  if (!address) throw new Error('The demo project has no address')
  await page.goto(address + subPath)
  return address
}

async function openFirstAnalysis(page: Page): Promise<void> {
  await openProject(page, '/analyses')
  await page.getByRole('table').getByRole('link').first().click()
  await new BenchPage(page).allFigures()
}

test('an editor pins notes; a viewer reads them and can change nothing', async ({ browser }) => {
  const editor = await pageOf(browser, 'editor')
  await openFirstAnalysis(editor)
  const text = `Gusts from the west, ${Date.now()}`
  const track = editor.getByRole('region', { name: 'Track' })
  await track.getByRole('button', { name: 'Add a note' }).click()
  await track.getByLabel('Time into the run').fill('12.5')
  await track.getByRole('textbox', { name: 'Note' }).fill(text)
  await track.getByRole('button', { name: 'Add note' }).click()
  await expect(track.getByText(text)).toBeVisible()
  await editor.reload()
  const note = editor.getByRole('listitem').filter({ hasText: text })
  await expect(note).toContainText('at 12')

  const viewer = await pageOf(browser, 'viewer')
  await viewer.goto(editor.url())
  await expect(viewer.getByText(text)).toBeVisible({ timeout: 45_000 })
  await expect(viewer.getByRole('button', { name: 'Add a note' })).toHaveCount(0)
  await expect(viewer.getByRole('button', { name: /save/i })).toHaveCount(0)
  await expect(viewer.getByRole('button', { name: /make a correction table/i })).toHaveCount(0)

  await note.getByRole('button', { name: 'Change' }).click()
  await editor.getByRole('textbox', { name: 'Note' }).fill(`${text}, later calm`)
  await editor.getByRole('button', { name: 'Save', exact: true }).click()
  await expect(editor.getByText(`${text}, later calm`)).toBeVisible()
  await editor.getByRole('listitem').filter({ hasText: text }).getByRole('button', { name: 'Remove' }).click()
  await editor.getByRole('dialog').getByRole('button', { name: 'Remove' }).click()
  await expect(editor.getByText(text)).toHaveCount(0)
})

test('two people change the drive train at once: the second is told who was first and loses nothing', async ({
  browser,
}) => {
  const [owner, editor] = [await pageOf(browser, 'owner'), await pageOf(browser, 'editor')]
  await openProject(owner, '/drive')
  await openProject(editor, '/drive')
  const teeth = (page: Page) => page.getByLabel('Teeth of the worm wheel')
  await teeth(owner).fill('153')
  await teeth(editor).fill('154')
  await owner.getByRole('button', { name: 'Save the drive train' }).click()
  await expect(owner.getByText('Saved.')).toBeVisible()
  await editor.getByRole('button', { name: 'Save the drive train' }).click()
  await expect(editor.getByText(`${demoPerson('owner').displayName} changed this project meanwhile`)).toBeVisible()
  await expect(teeth(editor)).toHaveValue('154')
  await editor.getByRole('button', { name: 'Save mine instead' }).click()
  await expect(editor.getByText('Saved.')).toBeVisible()
  await teeth(editor).fill('152')
  await editor.getByRole('button', { name: 'Save the drive train' }).click()
  await expect(editor.getByText('Saved.')).toBeVisible()
})

test('a stranger finds no project, a visitor is asked to sign in', async ({ browser }) => {
  const owner = await pageOf(browser, 'owner')
  const address = await openProject(owner)
  const visitor = await (await browser.newContext()).newPage()
  await visitor.goto(address)
  await expect(visitor).toHaveURL(/\/sign-in\?next=/)

  await visitor.goto('/sign-up')
  await signUp(visitor, newcomer('Oda Stranger'))
  await expect(visitor).toHaveURL(/\/projects$/)
  expect((await visitor.goto(address))?.status()).toBe(404)
  await expect(visitor.getByText(HILLSIDE)).toHaveCount(0)
})

test('a recording is stored in the project and opens on its bench', async ({ browser }) => {
  const editor = await pageOf(browser, 'editor')
  await openProject(editor, '/runs/new')
  const bench = new BenchPage(editor)
  await bench.choose(visitorRecording().file)
  await expect(bench.title).toHaveText('Which column is what?')
  await editor.getByLabel('The displacement is measured').selectOption('axis')
  const name = `Visitor night ${Date.now()}`
  await editor.getByLabel('Name of the run').fill(name)
  await editor.getByRole('button', { name: 'Store this run' }).click()
  await expect(editor).toHaveURL(/\/runs\/[0-9a-f-]{36}/, { timeout: 45_000 })
  await bench.allFigures()
  // A worm of 180 teeth recorded, 152 in the drive train.
  await expect(editor.getByRole('region', { name: 'Harmonics' }).getByText('566.87')).toBeVisible()

  await editor.getByRole('button', { name: 'Change what is known' }).click()
  const dialog = editor.getByRole('dialog')
  await dialog.getByLabel('Temperature').fill('-3.5')
  await dialog.getByRole('button', { name: 'Save' }).click()
  await expect(editor.getByText(/^−3\.5\s°C$/)).toBeVisible()
})
