import 'server-only'
import { readFile } from 'node:fs/promises'
import { isIP } from 'node:net'
import { hostname } from 'node:os'
import { join } from 'node:path'
import { simpleParser, type AddressObject } from 'mailparser'
import { instantOfLocalMail, isLocalMailName, listLocalMails } from '@/db/mail/local-mail-folder'
import type { LocalMail } from '@/lib/schemas/local-mail'
import { addressesIn } from '@/lib/mail/addresses-in'
import { isFromThisMachine } from './client-address'
import { environment } from './environment'
import { AppError } from './errors'

const LOOPBACK_HOST = /^(localhost|127(\.\d{1,3}){3}|\[::1\])$/

/**
 * Whether the request was made to this machine by a name of its own or by a number. A page of another site, open in a browser
 * here, can let its own name lead to this machine; then the connection is local, and only the name tells.
 */
function isToThisMachine(headers: Headers): boolean {
  const host = headers.get('host') ?? ''
  if (!URL.canParse(`http://${host}`)) return false
  const name = new URL(`http://${host}`).hostname
  return (
    isIP(name.replace(/^\[|\]$/g, '')) !== 0 || /^(.+\.)?localhost$/.test(name) || name === hostname().toLowerCase()
  )
}

/**
 * The folder of the local mails, or null where there are none to be seen: mail really goes out, people use a public
 * address, or the asker sits at another machine or is another site's page. Whoever reads these mails can take over any account.
 */
export function openLocalMailFolder(headers: Headers): string | null {
  const { localMailFolder, baseOrigin } = environment()
  const isPublic = baseOrigin !== null && !LOOPBACK_HOST.test(new URL(baseOrigin).hostname)
  return isPublic || !isFromThisMachine(headers) || !isToThisMachine(headers) ? null : localMailFolder
}

/** @throws {AppError} not-found where there is no such folder */
export function localMailFolder(request: Request): string {
  const folder = openLocalMailFolder(request.headers)
  if (!folder) throw new AppError('not-found', 'There is nothing at this address')
  return folder
}

type ParsedMail = LocalMail & { html: string | null }

/** A message never changes, so it is read once; forgotten when its file is gone. */
const parsed = new Map<string, ParsedMail>()

function addressText(address: AddressObject | AddressObject[] | undefined): string {
  const all = address === undefined ? [] : Array.isArray(address) ? address : [address]
  return all
    .flatMap(({ value }) => value.map(({ name, address }) => (name ? `${name} <${address}>` : address)))
    .join(', ')
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
    links: addressesIn(plainText),
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
