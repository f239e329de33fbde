import 'server-only'
import { readFile } from 'node:fs/promises'
import { join } from 'node:path'
import { simpleParser, type AddressObject } from 'mailparser'
import { instantOfLocalMail, isLocalMailName, listLocalMails } from '@/db/mail/local-mail-folder'
import type { LocalMail } from '@/lib/schemas/local-mail'
import { environment } from './environment'
import { AppError } from './errors'

const LOOPBACK_HOST = /^(localhost|127(\.\d{1,3}){3}|\[::1\])$/

/** The folder of the local mails, or null where there are none to be seen: mail goes out, or this is a public address. */
export function openLocalMailFolder(): string | null {
  const { localMailFolder, baseOrigin } = environment()
  const isPublic = baseOrigin !== null && !LOOPBACK_HOST.test(new URL(baseOrigin).hostname)
  return isPublic ? null : localMailFolder
}

/** @throws {AppError} not-found where there is no such folder */
export function localMailFolder(): string {
  const folder = openLocalMailFolder()
  if (!folder) throw noSuchThing()
  return folder
}

function noSuchThing(): AppError {
  return new AppError('not-found', 'There is nothing at this address')
}

type ParsedMail = LocalMail & { html: string | null }

/** A message never changes, so it is read once; forgotten when its file is gone. */
const parsed = new Map<string, ParsedMail>()

function addressText(address: AddressObject | AddressObject[] | undefined): string {
  const all = address === undefined ? [] : Array.isArray(address) ? address : [address]
  return all.map(({ text }) => text).join(', ')
}

async function parseMail(folder: string, name: string): Promise<ParsedMail> {
  const path = join(folder, name)
  const known = parsed.get(path)
  if (known) return known
  const { to, from, subject, text, html } = await simpleParser(await readFile(path), { skipImageLinks: true })
  const plainText = text ?? ''
  const mail = {
    name,
    to: addressText(to),
    from: addressText(from),
    subject: subject ?? '(no subject)',
    at: instantOfLocalMail(name).toISOString(),
    text: plainText,
    html: html || null,
    hasHtml: Boolean(html),
    links: [...new Set(plainText.match(/https?:\/\/\S+/g))],
  }
  parsed.set(path, mail)
  return mail
}

/** Newest first. */
export async function readLocalMails(folder: string): Promise<ParsedMail[]> {
  const names = await listLocalMails(folder)
  const present = new Set(names.map((name) => join(folder, name)))
  for (const path of parsed.keys()) if (!present.has(path)) parsed.delete(path)
  const mails: ParsedMail[] = []
  for (const name of names) {
    // Deleted between the list and the reading.
    const mail = await parseMail(folder, name).catch(() => null)
    if (mail) mails.push(mail)
  }
  return mails
}

/** @throws {AppError} not-found */
export async function readLocalMail(folder: string, name: string): Promise<ParsedMail> {
  const mail = isLocalMailName(name) ? await parseMail(folder, name).catch(() => null) : null
  if (!mail) throw new AppError('not-found', 'This mail has been deleted')
  return mail
}
