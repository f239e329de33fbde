import { expect, test } from 'vitest'
import { currentHref, navItems, projectIdIn } from '@/components/shell/nav-items'

test.each([
  ['/projects/7', '7'],
  ['/projects/7/runs/3', '7'],
  ['/projects', null],
  ['/projects/new', null],
  ['/projects/import', null],
  ['/bench', null],
])('%s lies in project %s', (pathname, projectId) => {
  expect(projectIdIn(pathname)).toBe(projectId)
})

test('the innermost part of the project is the current one', () => {
  const items = navItems('/projects/7/runs/3', true)
  expect(currentHref('/projects/7/runs/3', items)).toBe('/projects/7/runs')
  expect(currentHref('/projects/7', items)).toBe('/projects/7')
  expect(currentHref('/account', navItems('/account', true))).toBeUndefined()
})

test('strangers are shown the bench only', () => {
  expect(navItems('/', false).map(({ label }) => label)).toEqual(['Bench'])
  expect(navItems('/', true).map(({ label }) => label)).toEqual(['Projects', 'Bench'])
})
