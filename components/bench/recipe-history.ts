import type { Recipe } from '@/lib/analysis/types'

/** Recipes before and after the present one; the present one itself is kept by whoever owns the bench. */
export interface RecipeHistory {
  past: readonly Recipe[]
  future: readonly Recipe[]
  /** The setting that was changed last, and when; quick changes of one setting are one step. */
  last: { key: string | null; atMs: number } | null
}

export const EMPTY_HISTORY: RecipeHistory = { past: [], future: [], last: null }

const MOST_STEPS = 200
/** Typing "567" is one step, not three. */
const ONE_STEP_MS = 1200

export interface RecipeChange {
  /** The recipe that is being left. */
  from: Recipe
  /** Which setting changes; null for a press that is a step of its own, however soon it follows the one before. */
  key: string | null
  atMs: number
}

/** After a change: one step more to undo, nothing to redo. */
export function recordChange(history: RecipeHistory, { from, key, atMs }: RecipeChange): RecipeHistory {
  const { last, past } = history
  const isSameStep =
    key !== null && past.length > 0 && last !== null && last.key === key && atMs - last.atMs < ONE_STEP_MS
  return {
    past: isSameStep ? past : [...past, from].slice(-MOST_STEPS),
    future: [],
    last: { key, atMs },
  }
}

export interface HistoryStep {
  history: RecipeHistory
  recipe: Recipe
}

export function undo({ past, future }: RecipeHistory, present: Recipe): HistoryStep | null {
  const recipe = past.at(-1)
  return recipe ? { recipe, history: { past: past.slice(0, -1), future: [present, ...future], last: null } } : null
}

export function redo({ past, future }: RecipeHistory, present: Recipe): HistoryStep | null {
  const [recipe, ...rest] = future
  return recipe ? { recipe, history: { past: [...past, present], future: rest, last: null } } : null
}
