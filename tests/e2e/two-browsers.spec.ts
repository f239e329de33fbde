import { expect, test, type Page } from '@playwright/test'
import { visitorRecording } from './fixtures/recordings'
import { BenchPage } from './support/bench-page'
import { openDemoAnalysis } from './support/demo-project'
import { addWholeNote, noteWith, removeNote } from './support/notes-page'
import { browserOf, demoPerson } from './support/people'

const mira = demoPerson('owner').displayName
const tomas = demoPerson('editor').displayName

const editorOf = (page: Page) => page.getByRole('form', { name: 'Change the note' })

async function startChange(page: Page, text: string, next: string): Promise<void> {
  await noteWith(page, text).getByRole('button', { name: 'Change' }).click()
  await editorOf(page).getByRole('textbox', { name: 'Note' }).fill(next)
}

async function saveNote(page: Page): Promise<void> {
  await editorOf(page).getByRole('button', { name: 'Save', exact: true }).click()
}

test('two people change one note: both texts are seen, and the second person decides', async ({ browser }) => {
  const [owner, editor] = [await browserOf(browser, 'owner'), await browserOf(browser, 'editor')]
  const address = await openDemoAnalysis(editor)
  const text = `Belt looked worn ${Date.now()}`
  await addWholeNote(editor, text)
  await owner.goto(address)
  await expect(noteWith(owner, text)).toBeVisible({ timeout: 45_000 })

  await startChange(owner, text, `${text}, says Mira`)
  await startChange(editor, text, `${text}, says Tomas`)
  await saveNote(owner)
  await expect(noteWith(owner, `${text}, says Mira`)).toBeVisible()
  // She goes on from what she has just saved, before he decides about his.
  await startChange(owner, text, `${text}, says Mira again`)
  await saveNote(editor)
  await expect(editor.getByText(`${mira} changed this note meanwhile`)).toBeVisible()
  await expect(editor.getByText(`${text}, says Mira`)).toBeVisible()
  await expect(editorOf(editor).getByRole('textbox', { name: 'Note' })).toHaveValue(`${text}, says Tomas`)
  await editor.getByRole('button', { name: 'Save mine instead' }).click()
  await expect(noteWith(editor, `${text}, says Tomas`).getByText(`by ${tomas}`)).toBeVisible()

  // Now hers is the older one, whatever her page has learnt meanwhile; she takes what he wrote.
  await saveNote(owner)
  await expect(owner.getByText(`${tomas} changed this note meanwhile`)).toBeVisible()
  await owner.getByRole('button', { name: 'Take theirs' }).click()
  await expect(noteWith(owner, `${text}, says Tomas`)).toBeVisible()
  await removeNote(owner, text)
})

test('one deletes the note that the other is changing: it can be added anew', async ({ browser }) => {
  const [owner, editor] = [await browserOf(browser, 'owner'), await browserOf(browser, 'editor')]
  const address = await openDemoAnalysis(editor)
  const text = `To be removed ${Date.now()}`
  await addWholeNote(editor, text)
  await owner.goto(address)
  await expect(noteWith(owner, text)).toBeVisible({ timeout: 45_000 })
  await startChange(editor, text, `${text}, but kept`)
  await removeNote(owner, text)
  await saveNote(editor)
  await expect(editor.getByText('Somebody removed this note meanwhile')).toBeVisible()
  await expect(editorOf(editor).getByRole('textbox', { name: 'Note' })).toHaveValue(`${text}, but kept`)
  await editor.getByRole('button', { name: 'Add mine as a new note' }).click()
  await expect(noteWith(editor, `${text}, but kept`).getByRole('button', { name: 'Change' })).toBeVisible()
  await removeNote(editor, text)
})

test('two people rename one analysis: the second sees the other name and decides', async ({ browser }) => {
  const [owner, editor] = [await browserOf(browser, 'owner'), await browserOf(browser, 'editor')]
  const address = await openDemoAnalysis(editor)
  await owner.goto(address)
  await new BenchPage(owner).allFigures()
  const open = async (page: Page) => {
    await page.getByRole('button', { name: 'Rename' }).click()
    return page.getByRole('dialog', { name: 'Rename this analysis' })
  }
  const [mine, theirs] = [await open(owner), await open(editor)]
  const field = (dialog: typeof mine) => dialog.getByLabel('Name of the analysis')
  const before = await field(mine).inputValue()
  await field(mine).fill(`${before} by Mira`)
  await field(theirs).fill(`${before} by Tomas`)
  await mine.getByRole('button', { name: 'Save the name' }).click()
  await expect(mine).toBeHidden()
  await expect(owner.getByText(`${before} by Mira`).first()).toBeVisible()
  await theirs.getByRole('button', { name: 'Save the name' }).click()
  await expect(theirs.getByText(`${mira} changed this analysis meanwhile`)).toBeVisible()
  await expect(theirs.getByText(`“${before} by Mira”`)).toBeVisible()
  await expect(field(theirs)).toHaveValue(`${before} by Tomas`)
  await theirs.getByRole('button', { name: 'Take theirs' }).click()
  await expect(theirs).toBeHidden()
  await expect(editor.getByText(`${before} by Mira`).first()).toBeVisible()

  const again = await open(editor)
  await field(again).fill(before)
  await again.getByRole('button', { name: 'Save the name' }).click()
  await expect(again).toBeHidden()
})

test('two people change what is known of one run: the second is told what differs', async ({ browser }) => {
  const [owner, editor] = [await browserOf(browser, 'owner'), await browserOf(browser, 'editor')]
  await openDemoAnalysis(editor)
  const runAddress = await editor.locator('a[href*="/runs/"]').first().getAttribute('href')
  if (!runAddress) throw new Error('The analysis leads to no run')
  const open = async (page: Page) => {
    await page.goto(runAddress)
    await page.getByRole('button', { name: 'Change what is known' }).click()
    return page.getByRole('dialog', { name: 'What is known of this run' })
  }
  const [mine, theirs] = [await open(owner), await open(editor)]
  const before = await mine.getByLabel('Temperature').inputValue()
  await mine.getByLabel('Temperature').fill('-7.5')
  await theirs.getByLabel('Load and balance').fill('Tail heavy')
  await mine.getByRole('button', { name: 'Save' }).click()
  await expect(mine).toBeHidden()
  await theirs.getByRole('button', { name: 'Save', exact: true }).click()
  await expect(theirs.getByText(`${mira} changed this run meanwhile`)).toBeVisible()
  await expect(theirs.getByText(/temperature −7\.5/)).toBeVisible()
  await expect(theirs.getByLabel('Load and balance')).toHaveValue('Tail heavy')
  await theirs.getByLabel('Temperature').fill('-7.5')
  await theirs.getByRole('button', { name: 'Save mine instead' }).click()
  await expect(theirs).toBeHidden()
  await expect(editor.getByText('Tail heavy')).toBeVisible()
  await expect(editor.getByText(/^−7\.5\s°C$/)).toBeVisible()

  await editor.getByRole('button', { name: 'Change what is known' }).click()
  const last = editor.getByRole('dialog', { name: 'What is known of this run' })
  await last.getByLabel('Temperature').fill(before)
  await last.getByLabel('Load and balance').fill('')
  await last.getByRole('button', { name: 'Save', exact: true }).click()
  await expect(last).toBeHidden()
})

test('a second tab of the open bench replaces the kept recording: the first says so after a reload', async ({
  page,
}) => {
  const first = new BenchPage(page)
  await first.open()
  await page.getByRole('button', { name: 'Take the sample run' }).click()
  const figures = await first.allFigures()
  await page.reload()
  expect(await first.allFigures()).toBe(figures)

  const second = new BenchPage(await page.context().newPage())
  await second.page.goto('/bench')
  await second.allFigures()
  await second.page.getByRole('button', { name: 'Another file' }).click()
  await second.choose(visitorRecording().file)
  await second.measuredOnTheAxis()
  await second.read()
  const others = await second.allFigures()
  expect(others).not.toBe(figures)

  await page.reload()
  await expect(page.getByText('Another tab has replaced the recording that was open here')).toBeVisible()
  await page.getByRole('button', { name: /of the other tab$/ }).click()
  expect(await first.allFigures()).toBe(others)
})
