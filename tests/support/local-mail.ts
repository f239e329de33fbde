import { mkdtempSync, rmSync } from 'node:fs'
import { readFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { simpleParser, type ParsedMail } from 'mailparser'
import { afterEach, beforeEach } from 'vitest'
import { listLocalMails } from '@/db/mail/local-mail-folder'

/** A folder for the local mail server's messages, empty before each test and gone after it. */
export function openMailFolder() {
  let folder = ''
  beforeEach(() => {
    folder = mkdtempSync(join(tmpdir(), 'turnwright-mail-'))
  })
  afterEach(() => rmSync(folder, { recursive: true, force: true }))
  return {
    get path() {
      return folder
    },
    /** What has come in, oldest first. */
    async mails(): Promise<ParsedMail[]> {
      const names = (await listLocalMails(folder)).reverse()
      return Promise.all(names.map(async (name) => simpleParser(await readFile(join(folder, name)))))
    },
  }
}

/** Asks again and again until it holds; gives up with what was found last. */
export async function until<T>(ask: () => Promise<T>, holds: (found: T) => boolean): Promise<T> {
  for (let attempt = 0; attempt < 300; attempt += 1) {
    const found = await ask()
    if (holds(found)) return found
    await new Promise((resolve) => setTimeout(resolve, 100))
  }
  throw new Error(`This did not come about: ${holds.toString()}`)
}
