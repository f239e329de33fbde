'use client'

import { useCallback, useEffect, useState } from 'react'
import type { Recipe } from '@/lib/analysis/types'
import { EMPTY_HISTORY, recordChange, redo, undo, type HistoryStep } from './recipe-history'

export interface RecipeEditing {
  /** Changes a setting; `key` names it, so that quick changes of one setting are one step; null: never. */
  change: (key: string | null, next: Recipe) => void
  undo: (() => void) | null
  redo: (() => void) | null
}

/** Undo and redo over a recipe that someone else owns; also by Ctrl+Z and Ctrl+Shift+Z (⌘ on a Mac). */
export function useRecipeHistory(recipe: Recipe, onRecipeChange: (recipe: Recipe) => void): RecipeEditing {
  const [history, setHistory] = useState(EMPTY_HISTORY)

  const change = useCallback(
    (key: string | null, next: Recipe) => {
      setHistory((before) => recordChange(before, { from: recipe, key, atMs: Date.now() }))
      onRecipeChange(next)
    },
    [recipe, onRecipeChange],
  )
  const take = useCallback(
    (step: HistoryStep | null) => {
      if (!step) return
      setHistory(step.history)
      onRecipeChange(step.recipe)
    },
    [onRecipeChange],
  )

  useEffect(() => {
    function onKeyDown(event: KeyboardEvent) {
      if (!(event.ctrlKey || event.metaKey) || event.altKey || isTextField(event.target)) return
      const key = event.key.toLowerCase()
      const isRedo = (key === 'z' && event.shiftKey) || key === 'y'
      if (key !== 'z' && !isRedo) return
      event.preventDefault()
      take(isRedo ? redo(history, recipe) : undo(history, recipe))
    }
    window.addEventListener('keydown', onKeyDown)
    return () => window.removeEventListener('keydown', onKeyDown)
  }, [history, recipe, take])

  return {
    change,
    undo: history.past.length > 0 ? () => take(undo(history, recipe)) : null,
    redo: history.future.length > 0 ? () => take(redo(history, recipe)) : null,
  }
}

/** Within a text the keys undo the typing, as everywhere. */
function isTextField(target: EventTarget | null): boolean {
  if (!(target instanceof HTMLElement)) return false
  if (target instanceof HTMLInputElement) return !['checkbox', 'radio', 'button', 'range'].includes(target.type)
  return target instanceof HTMLTextAreaElement || target.isContentEditable
}
