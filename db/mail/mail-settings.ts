import { isIP } from 'node:net'

export interface MailSettings {
  databaseUrl: string
  smtpUrl: string
  linkOrigin: string
  from: string
}

/** Turnwright at the host of its own address; an address of numbers stands in brackets (RFC 5321, 4.1.3). */
function defaultSender(linkOrigin: string): string {
  const host = new URL(linkOrigin).hostname.replace(/^\[|\]$/g, '')
  const domain = { 0: host, 4: `[${host}]`, 6: `[IPv6:${host}]` }[isIP(host)] ?? host
  return `Turnwright <turnwright@${domain}>`
}

/** @throws {Error} that names what is missing; db/start.mjs sets all of it */
export function mailSettings(variables: Record<string, string | undefined>): MailSettings {
  const { DATABASE_URL, SMTP_URL, LINK_ORIGIN, MAIL_FROM } = variables
  const missing = Object.entries({ DATABASE_URL, SMTP_URL, LINK_ORIGIN }).flatMap(([name, value]) =>
    value ? [] : name,
  )
  if (!DATABASE_URL || !SMTP_URL || !LINK_ORIGIN) throw new Error(`Mail needs ${missing.join(', ')} to be set`)
  const linkOrigin = new URL(LINK_ORIGIN).origin
  return { databaseUrl: DATABASE_URL, smtpUrl: SMTP_URL, linkOrigin, from: MAIL_FROM || defaultSender(linkOrigin) }
}
