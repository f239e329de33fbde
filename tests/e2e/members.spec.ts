import { expect, test, type Page } from '@playwright/test'
import { visitorRecording } from './fixtures/recordings'
import { BenchPage } from './support/bench-page'
import { demoAddress, HILLSIDE } from './support/demo-project'
import { makeOwnProject } from './support/own-project'
import { browserOf, demoPerson, newcomer, signUp } from './support/people'

test('two people change the drive train at once: the second is told who was first and loses nothing', async ({
  browser,
}) => {
  const [owner, editor] = [await browserOf(browser, 'owner'), await browserOf(browser, 'editor')]
  const drive = `${await demoAddress(owner)}/drive`
  for (const page of [owner, editor]) await page.goto(drive)
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
  const owner = await browserOf(browser, 'owner')
  const address = await demoAddress(owner)
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
  const editor = await browserOf(browser, 'editor')
  const { address } = await makeOwnProject(editor, 'Run mount')
  await editor.goto(`${address}/runs/new`)
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
