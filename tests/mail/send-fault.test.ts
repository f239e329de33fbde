import { expect, test } from 'vitest'
import { sendFault } from '@/db/mail/send-fault'

const fault = (given: object) => Object.assign(new Error('550 <someone@example.org> secret'), given)

test.each([
  ['no answer', fault({ code: 'ECONNREFUSED' }), false, /can’t be reached/],
  ['a name that leads nowhere', fault({ code: 'EDNS' }), false, /can’t be reached/],
  ['turned away for now', fault({ code: 'ECONNECTION', responseCode: 421 }), false, /sent again by itself/],
  ['full mailbox', fault({ code: 'EENVELOPE', responseCode: 452, command: 'RCPT TO' }), false, /sent again by itself/],
  ['no such mailbox', fault({ code: 'EENVELOPE', responseCode: 550, command: 'RCPT TO' }), true, /how it is spelt/],
  [
    'a sender that is not allowed',
    fault({ code: 'EENVELOPE', responseCode: 550, command: 'MAIL FROM' }),
    false,
    /again/,
  ],
  ['wrong password', fault({ code: 'EAUTH', responseCode: 535 }), false, /does not let Turnwright in/],
  ['something else', 'odd', false, /can’t be reached/],
])('%s', (_, error, isForGood, words) => {
  const found = sendFault(error)
  expect(found.isForGood).toBe(isForGood)
  expect(found.words).toMatch(words)
  expect(`${found.words} ${found.code}`).not.toMatch(/example\.org|secret/)
})
