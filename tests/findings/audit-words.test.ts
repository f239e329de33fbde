import { readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { expect, test } from 'vitest'
import { AUDIT_WORDS, auditThings, auditWords } from '@/lib/findings/audit-words'

/** Every name of an action that code of ours hands to the log. */
function writtenActions(): Set<string> {
  const found = new Set<string>()
  for (const folder of ['app', 'db', 'lib/server']) {
    for (const entry of readdirSync(folder, { recursive: true, withFileTypes: true })) {
      if (!entry.isFile() || !/\.tsx?$/.test(entry.name)) continue
      const text = readFileSync(join(entry.parentPath, entry.name), 'utf8')
      if (!/insert(Audit|Account)Event/.test(text)) continue
      for (const [, action] of text.matchAll(/['"`]([a-z]+(?:-[a-z]+)*\.[a-z]+(?:-[a-z]+)*)['"`]/g)) {
        if (isAction(action, text)) found.add(action)
      }
    }
  }
  return found
}

/** Names of columns look alike; what follows `action:` up to the subject, or is chosen there, is an action. */
function isAction(name: string, text: string): boolean {
  return [...text.matchAll(/action(?::|\s=)[^\n]*(?:\n[^\n]*)?/g)].some(([passage]) => passage.includes(`'${name}'`))
}

test('every action that the code writes has words, and every word is of an action that is written', () => {
  const written = writtenActions()
  expect(written.size).toBeGreaterThan(15)
  expect([...written].sort()).toEqual(Object.keys(AUDIT_WORDS).sort())
})

test('what was done stands in words; an unknown action is shown as it is', () => {
  expect(auditWords('run.delete')).toBe('deleted the run')
  expect(auditWords('gear.turn-back')).toBe('gear: turn back')
})

test('kinds of things can be chosen, each once', () => {
  const things = auditThings()
  expect(things).toContainEqual({ value: 'run', label: 'Runs' })
  expect(things).toContainEqual({ value: 'analysis', label: 'Analyses' })
  expect(new Set(things.map(({ value }) => value)).size).toBe(things.length)
  expect(things.map(({ value }) => value)).not.toContain('account')
})
