import { expect, test } from 'vitest'
import { EMPTY_HISTORY, recordChange, redo, undo } from '@/components/bench/recipe-history'
import { defaultRecipe } from '@/lib/schemas/recipe'

const recipe = (harmonicCount: number) => ({ ...defaultRecipe(), harmonicCount })

test('steps back and forth through the recipes', () => {
  let history = recordChange(EMPTY_HISTORY, { from: recipe(1), key: 'a', atMs: 0 })
  history = recordChange(history, { from: recipe(2), key: 'b', atMs: 10 })
  const first = undo(history, recipe(3))!
  expect(first.recipe.harmonicCount).toBe(2)
  const second = undo(first.history, first.recipe)!
  expect(second.recipe.harmonicCount).toBe(1)
  expect(undo(second.history, second.recipe)).toBeNull()
  const forth = redo(second.history, second.recipe)!
  expect(forth.recipe.harmonicCount).toBe(2)
  expect(redo(forth.history, forth.recipe)!.recipe.harmonicCount).toBe(3)
})

test('quick changes of one setting are one step; slow ones and others are their own', () => {
  const at = (history: typeof EMPTY_HISTORY, key: string | null, atMs: number) =>
    recordChange(history, { from: recipe(atMs), key, atMs })
  const typed = at(at(at(EMPTY_HISTORY, 'a', 0), 'a', 300), 'a', 600)
  expect(typed.past).toHaveLength(1)
  expect(at(typed, 'a', 5000).past).toHaveLength(2)
  expect(at(typed, 'b', 700).past).toHaveLength(2)
  expect(at(at(EMPTY_HISTORY, null, 0), null, 300).past).toHaveLength(2)
})

test('a change after undo leaves nothing to redo', () => {
  const history = recordChange(EMPTY_HISTORY, { from: recipe(1), key: 'a', atMs: 0 })
  const back = undo(history, recipe(2))!
  expect(back.history.future).toHaveLength(1)
  expect(recordChange(back.history, { from: back.recipe, key: 'a', atMs: 1 }).future).toEqual([])
})
