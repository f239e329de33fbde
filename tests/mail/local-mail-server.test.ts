import { writeFileSync } from 'node:fs'
import { join } from 'node:path'
import nodemailer from 'nodemailer'
import { afterEach, expect, test } from 'vitest'
import {
  deleteLocalMails,
  instantOfLocalMail,
  isLocalMailRefusing,
  keepLocalMail,
  listLocalMails,
  setLocalMailRefusing,
} from '@/db/mail/local-mail-folder'
import { startLocalMailServer, type LocalMailServer } from '@/db/mail/local-mail-server'
import { openMailFolder } from '../support/local-mail'

const folder = openMailFolder()
let server: LocalMailServer | undefined

afterEach(() => server?.stop())

async function send(text: string, subject = 'A calm night') {
  server ??= await startLocalMailServer({ folder: folder.path, most: 3 })
  const transport = nodemailer.createTransport({ url: `smtp://127.0.0.1:${server.port}` })
  return transport.sendMail({ from: 'a@hillside.example', to: 'b@hillside.example', subject, text })
}

test('what is sent over SMTP lies in the folder, whole', async () => {
  await send('The worm ran evenly – all night. ∿\n.\n..two dots')
  const [mail] = await folder.mails()
  expect(mail.subject).toBe('A calm night')
  expect(mail.text).toBe('The worm ran evenly – all night. ∿\n.\n..two dots\n')
  server = void (await server?.stop())
})

test('the newest ones are kept, in the order in which they came', async () => {
  for (const subject of ['one', 'two', 'three', 'four', 'five']) await send('text', subject)
  expect((await folder.mails()).map(({ subject }) => subject)).toEqual(['three', 'four', 'five'])
  server = void (await server?.stop())
})

test('told to refuse, it turns mail away with 421 until told otherwise', async () => {
  await setLocalMailRefusing(folder.path, true)
  expect(isLocalMailRefusing(folder.path)).toBe(true)
  await expect(send('text')).rejects.toMatchObject({ responseCode: 421 })
  await setLocalMailRefusing(folder.path, false)
  await send('text')
  expect(await folder.mails()).toHaveLength(1)
  server = void (await server?.stop())
})

test('what is too large is refused and leaves nothing', async () => {
  await expect(send('x'.repeat(3 * 1024 * 1024))).rejects.toMatchObject({ responseCode: 552 })
  expect(await folder.mails()).toEqual([])
  server = void (await server?.stop())
})

test('messages of one moment have names in the order of their arrival, which tell the moment', async () => {
  const before = Date.now()
  for (const text of ['1', '2', '3']) await keepLocalMail(folder.path, Buffer.from(text))
  const names = await listLocalMails(folder.path)
  expect(names).toEqual([...names].sort().reverse())
  expect(new Set(names.map((name) => instantOfLocalMail(name).getTime())).size).toBe(3)
  expect(instantOfLocalMail(names[2]).getTime()).toBeGreaterThanOrEqual(before)
})

test('deleting takes the messages and leaves everything else', async () => {
  await keepLocalMail(folder.path, Buffer.from('text'))
  await setLocalMailRefusing(folder.path, true)
  writeFileSync(join(folder.path, 'note.eml'), '')
  await deleteLocalMails(folder.path)
  expect(await listLocalMails(folder.path)).toEqual([])
  expect(isLocalMailRefusing(folder.path)).toBe(true)
})

test('a folder that is not there yet holds nothing', async () => {
  const path = join(folder.path, 'later')
  expect(await listLocalMails(path)).toEqual([])
  expect(isLocalMailRefusing(path)).toBe(false)
})
