import { existsSync } from 'node:fs'
import { mkdir, readdir, rename, rm, writeFile } from 'node:fs/promises'
import { join } from 'node:path'
import { randomBytes } from 'node:crypto'

/*
 * Where the local mail server keeps what it takes: one .eml file per message, named so that their order is that of their
 * arrival. While the file `refusing` lies there, the server turns everyone away.
 */

const REFUSING = 'refusing'
const MESSAGE_NAME = /^\d{14}-[0-9a-f]{12}\.eml$/

/** The newest ones that are kept. */
const MOST_LOCAL_MAILS = 200

export function isLocalMailName(name: string): boolean {
  return MESSAGE_NAME.test(name)
}

/** When it came in. */
export function instantOfLocalMail(name: string): Date {
  return new Date(Number(name.slice(0, 14)))
}

/** Names of the messages, newest first; none where there is no folder yet. */
export async function listLocalMails(folder: string): Promise<string[]> {
  if (!existsSync(folder)) return []
  return (await readdir(folder)).filter(isLocalMailName).sort().reverse()
}

let lastInstant = 0

/** Two messages of one moment still come in their order. */
function nextInstant(): string {
  lastInstant = Math.max(Date.now(), lastInstant + 1)
  return String(lastInstant).padStart(14, '0')
}

/** Written beside its place and moved there when it is whole; the oldest beyond the limit go. */
export async function keepLocalMail(folder: string, message: Buffer, most = MOST_LOCAL_MAILS): Promise<void> {
  const name = `${nextInstant()}-${randomBytes(6).toString('hex')}.eml`
  await mkdir(folder, { recursive: true })
  const making = join(folder, `${name}.making`)
  await writeFile(making, message, { mode: 0o600 })
  await rename(making, join(folder, name))
  const old = (await listLocalMails(folder)).slice(most)
  for (const each of old) await rm(join(folder, each), { force: true })
}

export async function deleteLocalMails(folder: string): Promise<void> {
  for (const name of await listLocalMails(folder)) await rm(join(folder, name), { force: true })
}

export function isLocalMailRefusing(folder: string): boolean {
  return existsSync(join(folder, REFUSING))
}

export async function setLocalMailRefusing(folder: string, isRefusing: boolean): Promise<void> {
  const path = join(folder, REFUSING)
  if (!isRefusing) return rm(path, { force: true })
  await mkdir(folder, { recursive: true })
  await writeFile(path, '')
}
