import { expect, test } from 'vitest'
import { mailSettings } from '@/db/mail/mail-settings'

const given = { DATABASE_URL: 'postgres://u:p@localhost/x', SMTP_URL: 'smtp://127.0.0.1:25' }

test.each([
  ['https://turnwright.example.org/', undefined, 'Turnwright <turnwright@turnwright.example.org>'],
  ['http://localhost:3000', '', 'Turnwright <turnwright@localhost>'],
  ['http://127.0.0.1:3000', undefined, 'Turnwright <turnwright@[127.0.0.1]>'],
  ['http://[::1]:3000', undefined, 'Turnwright <turnwright@[IPv6:::1]>'],
  ['https://turnwright.example.org', 'Club <mail@example.org>', 'Club <mail@example.org>'],
])('at %s with MAIL_FROM %s the sender is %s', (LINK_ORIGIN, MAIL_FROM, from) => {
  const settings = mailSettings({ ...given, LINK_ORIGIN, MAIL_FROM })
  expect(settings.from).toBe(from)
  expect(settings.linkOrigin).toBe(new URL(LINK_ORIGIN).origin)
})

test('what is missing is named, and nothing else', () => {
  expect(() => mailSettings({ SMTP_URL: 'smtp://user:secret@m' })).toThrow(
    'Mail needs DATABASE_URL, LINK_ORIGIN to be set',
  )
})
