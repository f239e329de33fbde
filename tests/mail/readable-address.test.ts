import { expect, test } from 'vitest'
import { isReadableAddress } from '@/db/local/readable-address.mjs'

test.each(['/', '/share/abc', '/projects?q=%ff', '/a%20b', '/%F0%9F%94%AD', '/%00', undefined])('%s is read', (url) => {
  expect(isReadableAddress(url)).toBe(true)
})

test.each(['/share/%ff', '/%E0%A4%A', '/%ed%a0%80', '/%', '/%zz?q=1'])('%s is no text', (url) => {
  expect(isReadableAddress(url)).toBe(false)
})
