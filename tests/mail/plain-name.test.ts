import { expect, test } from 'vitest'
import { addressesIn } from '@/lib/mail/addresses-in'
import { plainName } from '@/lib/mail/plain-name'

test.each([
  ['Mira Okafor', 'Mira Okafor'],
  ['J. R. Ashdown', 'J. R. Ashdown'],
  ['A.B. Ashdown', 'A.B. Ashdown'],
  ['Belt v2.1', 'Belt v2.1'],
  ['two\r\nlines\tand  tabs', 'two lines and tabs'],
  ['see\u200b this\u202e', 'see this'],
  ['go to evil.example', 'go to evil. example'],
  ['http://evil.example/x', 'http: //evil. example/x'],
  ['  ', ''],
  ['m'.repeat(200), `${'m'.repeat(119)}…`],
])('%j becomes %j', (typed, expected) => {
  expect(plainName(typed)).toBe(expected)
})

test('addresses are found without the full stop or bracket behind them', () => {
  const text = 'At https://a.example/x?y=1. Or (http://b.example:3000/), or https://a.example/x?y=1'
  expect(addressesIn(text)).toEqual(['https://a.example/x?y=1', 'http://b.example:3000/'])
})
