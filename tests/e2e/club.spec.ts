import { expect, test, type Page } from '@playwright/test'
import { semicolonRecording, visitorRecording, type FixtureFile } from './fixtures/recordings'
import { BenchPage } from './support/bench-page'
import { addTrackNote, addWholeNote, noteWith } from './support/notes-page'
import { demoPerson } from './support/people'
import { joinWithoutAccount, newAddress, ownersPeople } from './support/people-page'
import { SharePanel, strangersPage } from './support/report-page'
import { SERVER_ORIGIN } from './support/server'

const title = (page: Page) => page.getByRole('heading', { level: 1 })

/** Brings a recording into the project, and ends on the bench of its run. */
async function storeRun(page: Page, project: string, file: FixtureFile): Promise<void> {
  await page.goto(`${project}/runs/new`)
  const bench = new BenchPage(page)
  await bench.choose(file)
  await expect(bench.title).toHaveText('Which column is what?')
  await bench.measuredOnTheAxis()
  await page.getByRole('button', { name: 'Store this run' }).click()
  await expect(page).toHaveURL(/\/runs\/[0-9a-f-]{36}/, { timeout: 45_000 })
  await bench.allFigures()
}

test('a club works on one mount: two join from their mails, one works, one reads, a stranger sees one report', async ({
  browser,
}) => {
  test.setTimeout(240_000)
  const nora = 'Nora Newcomer'
  const editorEmail = newAddress('nora')
  const ines = demoPerson('viewer')

  const owner = await ownersPeople(browser, 'Club mount')
  const project = owner.project.address
  await expect(title(owner.page)).toHaveText('Only you work on this mount')
  await owner.invite(editorEmail, 'editor')
  await owner.invite(ines.email, 'viewer')
  await expect(title(owner.page)).toContainText('two invitations wait')
  for (const email of [editorEmail, ines.email]) await expect(owner.invitation(email)).toContainText(/sent \d+/)

  // An editor without an account, from the mail.
  const { page: editor } = await strangersPage(browser)
  const link = await owner.linkFor(editorEmail)
  await editor.goto(link)
  await expect(title(editor)).toContainText(`invites you to “${owner.project.name}” as an editor`)
  await joinWithoutAccount(editor, link, nora)

  // A viewer with an account, from the mail.
  const { page: viewer } = await strangersPage(browser)
  await viewer.goto(await owner.linkFor(ines.email))
  await viewer.getByRole('link', { name: 'Sign in to join' }).click()
  await viewer.getByLabel('E-mail').fill(ines.email)
  await viewer.getByLabel('Password', { exact: true }).fill(ines.password)
  await viewer.getByRole('button', { name: 'Sign in' }).click()
  await viewer.getByRole('button', { name: `Join as ${ines.displayName}` }).click()
  await expect(viewer).toHaveURL(new RegExp(`${project}$`))
  await owner.open()
  await expect(title(owner.page)).toHaveText('Three people share this mount')
  await expect(owner.member(nora).getByRole('combobox')).toHaveValue('editor')
  await expect(owner.member(ines.displayName).getByRole('combobox')).toHaveValue('viewer')

  // The editor brings in two runs, saves an analysis, pins notes and shares it.
  await storeRun(editor, project, semicolonRecording().file)
  await storeRun(editor, project, visitorRecording().file)
  await editor.getByRole('button', { name: 'Save analysis' }).click()
  const saving = editor.getByRole('dialog', { name: 'Save this analysis' })
  await saving.getByLabel('Name of the analysis').fill('As it came')
  await saving.getByRole('button', { name: 'Save' }).click()
  await expect(editor).toHaveURL(/\/analyses\/[0-9a-f-]{36}/, { timeout: 45_000 })
  const analysis = new URL(editor.url()).pathname
  const figures = await new BenchPage(editor).allFigures()
  await addTrackNote(editor, 'A gust from the west', 12)
  await addWholeNote(editor, 'The belt was new that night')
  await editor.reload()
  await expect(noteWith(editor, 'A gust from the west')).toContainText(`${nora}, `)

  // The viewer reads all of it, and can change nothing.
  await viewer.goto(`${project}/runs`)
  for (const name of ['visitor-run', 'visitor-run-semicolon']) {
    await expect(viewer.getByRole('link', { name, exact: true })).toBeVisible()
  }
  await expect(viewer.getByRole('link', { name: 'Bring in a run' })).toHaveCount(0)
  await viewer.goto(analysis)
  expect(await new BenchPage(viewer).allFigures()).toBe(figures)
  for (const text of ['A gust from the west', 'The belt was new that night']) {
    await expect(noteWith(viewer, text)).toContainText(`${nora}, `)
    await expect(noteWith(viewer, text).getByRole('button')).toHaveCount(0)
  }
  await expect(viewer.getByRole('button', { name: /save|share|rename|add a note|make a correction/i })).toHaveCount(0)
  await viewer.goto(`${project}/people`)
  await expect(viewer.getByText('You are a viewer')).toBeVisible()
  await expect(viewer.getByText(editorEmail)).toHaveCount(0)
  await expect(viewer.getByRole('button', { name: /^(Send the invitation|Remove)/ })).toHaveCount(0)
  const headers = { origin: SERVER_ORIGIN }
  const note = { anchor: { kind: 'whole' }, text: 'Mine' }
  const renamed = await viewer.request.patch(`/api${project}`, { headers, data: { version: 1, name: 'Mine now' } })
  const added = await viewer.request.post(`/api${analysis}/notes`, { headers, data: note })
  const stored = await viewer.request.post(`/api${project}/runs?name=Mine&fileName=mine.csv`, { headers, data: 'a,b' })
  expect([renamed, added, stored].map((answer) => answer.status())).toEqual([403, 403, 403])

  // A stranger reads the report with the note that was chosen, until the link is revoked.
  const panel = new SharePanel(editor)
  await panel.open()
  const address = await panel.make('For the support desk', 'The belt was new that night')
  const { page: stranger } = await strangersPage(browser)
  expect((await stranger.goto(address))?.status()).toBe(200)
  await expect(stranger.getByText('For the support desk')).toBeVisible()
  await expect(stranger.getByText('The belt was new that night')).toBeVisible()
  await expect(stranger.getByText('A gust from the west')).toHaveCount(0)
  expect((await stranger.goto(analysis))?.url()).toContain('/sign-in?next=')
  await panel.revoke(address)
  expect((await stranger.goto(address))?.status()).toBe(410)
  await expect(title(stranger)).toHaveText('This link has ended')

  // The log tells the owner who did what.
  await owner.page.goto(`${project}/settings/trail`)
  await expect(
    owner.page.getByRole('row', { name: new RegExp(`${nora} brought in the run visitor-run-semicolon`) }),
  ).toBeVisible()
})
