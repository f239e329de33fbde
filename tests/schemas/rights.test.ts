import { describe, expect, test } from 'vitest'
import { canEditProject, canManageProject, rightsChange, whyNoEdit } from '@/lib/schemas/rights'

const archivedAt = '2026-11-20T20:00:00.000Z'

describe.each([
  { role: 'viewer', edits: false, manages: false },
  { role: 'editor', edits: true, manages: false },
  { role: 'owner', edits: true, manages: true },
] as const)('$role', ({ role, edits, manages }) => {
  test(`${edits ? 'edits' : 'only reads'} what is in use`, () => {
    expect(canEditProject({ role, archivedAt: null })).toBe(edits)
    expect(whyNoEdit({ role, archivedAt: null })).toEqual(edits ? null : expect.stringMatching(/owners and editors/))
  })

  test('edits nothing that is archived, and is told why', () => {
    expect(canEditProject({ role, archivedAt })).toBe(false)
    expect(whyNoEdit({ role, archivedAt })).toMatch(/archived/)
  })

  test(`${manages ? 'decides' : 'does not decide'} about the project`, () => {
    expect(canManageProject({ role })).toBe(manages)
  })
})

test('a change of role names what is gained and what is lost, and nothing twice', () => {
  expect(rightsChange('viewer', 'editor')).toEqual({ gained: expect.stringMatching(/^bring in runs/), lost: null })
  expect(rightsChange('owner', 'editor')).toEqual({ gained: null, lost: expect.stringMatching(/^decide who is here/) })
  expect(rightsChange('editor', 'editor')).toEqual({ gained: null, lost: null })
})
