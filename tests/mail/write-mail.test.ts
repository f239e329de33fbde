import { describe, expect, test } from 'vitest'
import { addressesIn } from '@/lib/mail/addresses-in'
import type { MailFacts } from '@/lib/mail/mail-facts'
import { writeMail } from '@/lib/mail/write-mail'

const ORIGIN = 'https://turnwright.example.org'
const token = 'tOkEn-0123456789_abcdefghijklmnopqrstuvwxyzA'
const expiresAt = new Date('2026-12-02T16:05:00Z')
const displayName = 'Mira Okafor'
const PROJECT = '0f4d7f0c-3a0e-4b39-9a52-0d6f1c3a7b11'
const ANALYSIS = '5b0e4c8a-1d2f-4e6a-8c7b-9a0b1c2d3e4f'
const invitation = {
  kind: 'invitation',
  inviterName: displayName,
  projectName: 'Hillside club mount',
  role: 'editor',
  token,
  expiresAt,
} as const
const mention = {
  kind: 'mention',
  displayName: 'Tomas',
  actorName: displayName,
  projectId: PROJECT,
  projectName: 'Hillside club mount',
  analysisId: ANALYSIS,
  analysisName: 'First night',
  noteText: 'Is the belt loose?\nLook at 207 s & at <b>this</b>',
} as const

/** Each kind, the path that its link leads to, and whether the link ends. */
const mails: [MailFacts, string, boolean][] = [
  [{ kind: 'sign-up', token, expiresAt }, `/verify-email?token=${token}`, true],
  [{ kind: 'sign-up-again', displayName }, '/sign-in', false],
  [{ kind: 'reset-password', displayName, token, expiresAt }, `/reset-password?token=${token}`, true],
  [{ kind: 'password-changed', displayName }, '/reset-password', false],
  [{ kind: 'change-email', displayName, token, expiresAt }, `/verify-email?token=${token}`, true],
  [{ kind: 'email-changed', displayName }, '/', false],
  [{ kind: 'account-deleted', displayName }, '/', false],
  [invitation, `/invite/${token}`, true],
  [mention, `/projects/${PROJECT}/analyses/${ANALYSIS}`, false],
]

const hrefs = (html: string) => [...html.matchAll(/href="([^"]+)"/g)].map(([, address]) => address)

describe.each(mails)('$kind', (facts, path, isEnding) => {
  const { subject, text, html } = writeMail(facts, ORIGIN)

  test('leads to the same page in both parts, and shows the address to be copied', () => {
    const address = `${ORIGIN}${path}`
    expect(addressesIn(text)[0]).toBe(address)
    const links = hrefs(html)
    expect(new Set(links)).toEqual(new Set([address.replaceAll('&', '&amp;')]))
    expect(html).toContain(`>${address.replaceAll('&', '&amp;')}</a>`)
  })

  test('says why one gets it, and until when its link works', () => {
    for (const part of [text, html]) {
      expect(part).toContain('You get this mail because')
      expect(part).toContain(ORIGIN)
      expect(part.includes('The link works once, until Wednesday, 2 December 2026 at 16:05 UTC.')).toBe(isEnding)
    }
  })

  test('fetches nothing, runs nothing, and has a language and a title', () => {
    expect(html).not.toMatch(/<(img|link|script|iframe|object|form)\b|url\(|\ssrc=|@import|\son[a-z]+=/i)
    expect(html).toContain('<html lang="en"')
    expect(html).toMatch(/<title>[^<]+<\/title>/)
  })

  test('has one line as its subject and a text that is complete', () => {
    expect(subject).toMatch(/^[^\r\n]{10,200}$/)
    expect(text).not.toMatch(/undefined|null|<(a|p|br|td|table)\b/)
    expect(html).not.toMatch(/undefined|>null/)
  })
})

describe('what other people typed', () => {
  const evil =
    'Eve <script>alert(1)</script>\r\nBcc: all@example.org\u202e "x" & https://evil.example/a www.evil.example'

  test.each<[string, MailFacts]>([
    ['the name of whoever invites', { ...invitation, inviterName: evil }],
    ['the name of a project', { ...invitation, projectName: evil }],
    ['the name of whoever wrote the note', { ...mention, actorName: evil }],
    ['the name of an analysis', { ...mention, analysisName: evil }],
    ['one’s own name', { kind: 'password-changed', displayName: evil }],
  ])('%s adds no header, no markup and no link', (_, facts) => {
    const { subject, text, html } = writeMail(facts, ORIGIN)
    expect(subject).not.toMatch(/[\r\n\u202e]/)
    expect(text).not.toMatch(/^Bcc:/m)
    expect(html).not.toContain('<script')
    expect(html).toContain('Eve &lt;script&gt;')
    for (const part of [subject, text]) expect(part).not.toMatch(/evil\.example|https:\/\/evil/)
    expect(addressesIn(text).every((address) => address.startsWith(ORIGIN))).toBe(true)
    expect(hrefs(html).every((address) => address.startsWith(ORIGIN))).toBe(true)
  })

  test('a sign-up to an address that is not proven carries nothing that was typed', () => {
    const { text } = writeMail({ kind: 'sign-up', token, expiresAt }, ORIGIN)
    expect(text).not.toContain('Hello')
  })

  test('a note is quoted line by line, as it was written', () => {
    const { text, html } = writeMail(mention, ORIGIN)
    expect(text).toContain('> Is the belt loose?\n> Look at 207 s & at <b>this</b>')
    expect(html).toContain('Is the belt loose?<br>Look at 207 s &amp; at &lt;b&gt;this&lt;/b&gt;')
  })

  test('a long note is cut, with a mark', () => {
    const { text } = writeMail({ ...mention, noteText: 'worm '.repeat(400) }, ORIGIN)
    expect(text).toMatch(/> (worm ){200}…/)
  })
})

test.each([
  ['owner', 'say who else may see it'],
  ['editor', 'upload runs'],
  ['viewer', 'see, compare and download'],
] as const)('an invitation as %s says what one may do', (role, words) => {
  expect(writeMail({ ...invitation, role }, ORIGIN).text).toContain(words)
})
