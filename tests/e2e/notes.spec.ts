import { expect, test } from '@playwright/test'
import { comeBackFor } from './support/come-back'
import { waitForMail } from './support/mail'
import { openDemoAnalysis } from './support/demo-project'
import { addWholeNote, noteWith, removeNote } from './support/notes-page'
import { browserOf, demoPerson } from './support/people'

test('an editor pins a note by clicking a picture and names the owner, who gets a mail; a viewer only reads', async ({
  browser,
}) => {
  const since = new Date()
  const [mira, editor] = [demoPerson('owner'), await browserOf(browser, 'editor')]
  const address = await openDemoAnalysis(editor)
  const track = editor.getByRole('region', { name: 'Track' })
  const picture = track.getByRole('img', { name: /Drag over the picture/ })
  await expect(picture).toHaveAttribute('aria-busy', 'false', { timeout: 45_000 })
  await picture.click({ position: { x: 200, y: 150 } })
  await track.getByRole('button', { name: 'Note here' }).click()
  const text = track.getByRole('textbox', { name: 'Note' })
  const mark = `gust ${Date.now()}`
  await text.pressSequentially(`A ${mark}, @${mira.displayName.slice(0, 3).toLowerCase()}`)
  const members = track.getByRole('listbox', { name: 'Members to name' })
  await expect(members.getByRole('option')).toHaveText([mira.displayName])
  await editor.keyboard.press('Enter')
  await editor.keyboard.type('please look')
  await track.getByRole('button', { name: 'Add note' }).click()
  const note = noteWith(editor, mark)
  await expect(note.locator('strong')).toHaveText(`@${mira.displayName}`)
  await expect(note).toContainText(`${demoPerson('editor').displayName}, `)

  const mail = await waitForMail(editor.request, { to: mira.email, subject: /./, since })
  expect(mail.text).toContain(mark)
  expect(mail.links.some((link) => link.includes(address))).toBe(true)

  // The note and its mark lead to one another.
  const number = await note.locator('span').first().innerText()
  await track.getByRole('button', { name: new RegExp(`^Note ${number}, at`) }).click()
  await expect(note).toBeFocused()

  const viewer = await browserOf(browser, 'viewer')
  await viewer.goto(address)
  const seen = noteWith(viewer, mark)
  await expect(seen).toBeVisible({ timeout: 45_000 })
  await expect(seen.getByRole('button')).toHaveCount(0)
  await expect(viewer.getByRole('button', { name: 'Add a note' })).toHaveCount(0)
  const noteId = (await note.getAttribute('id'))?.replace('note-', '')
  const refused = await viewer.evaluate(
    async ([project, id]) =>
      (
        await fetch(`/api${project}/notes/${id}/resolution`, {
          method: 'PUT',
          headers: { 'content-type': 'application/json' },
          body: JSON.stringify({ version: 1, isResolved: true }),
        })
      ).status,
    [address.replace(/\/analyses\/.*/, ''), noteId],
  )
  expect(refused).toBe(403)

  // The owner settles what the editor wrote.
  const owner = await browserOf(browser, 'owner')
  await owner.goto(address)
  await noteWith(owner, mark).getByRole('button', { name: 'Settle' }).click()
  const ownTrack = owner.getByRole('region', { name: 'Track' })
  await expect(ownTrack.getByText(/settled notes?$/)).toBeVisible()
  await owner.getByRole('heading', { level: 1 }).click()
  const settledMark = ownTrack.getByRole('button', { name: new RegExp(`^Note ${number}, .*, settled$`) })
  await expect(settledMark).toBeVisible()
  await ownTrack.getByLabel('on the pictures').uncheck()
  await expect(settledMark).toHaveCount(0)
  await ownTrack.getByRole('button', { name: 'show' }).click()
  await expect(noteWith(owner, mark)).toContainText(`by ${mira.displayName}`)
  await noteWith(owner, mark).getByRole('button', { name: 'Take up again' }).click()
  await expect(noteWith(owner, mark).getByRole('button', { name: 'Settle' })).toBeVisible()
  await removeNote(owner, mark)
})

test('what was being typed is back after a reload, and is kept when the session has ended', async ({ browser }) => {
  const editor = await browserOf(browser, 'editor')
  await openDemoAnalysis(editor)
  const whole = editor.getByRole('region', { name: 'Notes on the whole analysis' })
  await whole.getByRole('button', { name: 'Add a note' }).click()
  const text = `Half a thought ${Date.now()}`
  await whole.getByRole('textbox', { name: 'Note' }).fill(text)
  await editor.reload()
  await expect(whole.getByRole('textbox', { name: 'Note' })).toHaveValue(text)
  await expect(whole.getByText('What you were writing here before is back; it is not saved yet.')).toBeVisible()

  const cookies = await editor.context().cookies()
  await editor.context().clearCookies()
  await whole.getByRole('button', { name: 'Add note' }).click()
  await expect(whole.getByRole('link', { name: 'Sign in in another tab' })).toBeVisible()
  await expect(whole.getByRole('textbox', { name: 'Note' })).toHaveValue(text)
  await editor.context().addCookies(cookies)
  await whole.getByRole('button', { name: 'Add note' }).click()
  await expect(noteWith(editor, text)).toBeVisible()
  await removeNote(editor, text)
})

test('new notes of others appear when one comes back to the page', async ({ browser }) => {
  const [editor, owner] = [await browserOf(browser, 'editor'), await browserOf(browser, 'owner')]
  const address = await openDemoAnalysis(editor)
  await owner.goto(address)
  const text = `Seen at dusk ${Date.now()}`
  await addWholeNote(owner, text)
  await comeBackFor(editor, noteWith(editor, text))
  await removeNote(owner, text)
})
