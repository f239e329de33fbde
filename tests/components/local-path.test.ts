import { expect, test } from 'vitest'
import { localPath } from '@/lib/client/local-path'

test.each(['/bench', '/bench?recipe=1~a#spectrum', '/projects/3/runs/new', '/'])('keeps %s', (path) => {
  expect(localPath(path)).toBe(path)
})

// OWASP, Unvalidated Redirects and Forwards Cheat Sheet: addresses that look local and are not.
test.each([
  'https://elsewhere.example',
  '//elsewhere.example',
  '/\\elsewhere.example',
  '\\\\elsewhere.example',
  '/\t/elsewhere.example',
  '/\n/elsewhere.example',
  'javascript:alert(1)',
  'elsewhere',
  '',
  undefined,
  ['/bench', '/x'],
])('sends %j to the projects instead', (next) => {
  expect(localPath(next)).toBe('/projects')
})

test('a path that climbs to another host stays here', () => {
  expect(localPath('/..//elsewhere.example')).toBe('/projects')
})
