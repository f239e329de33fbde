'use client'

import { useEffect, useRef } from 'react'
import type { Recipe } from '@/lib/analysis/types'
import { readRecipeAddress, withRecipeAddress } from '@/lib/schemas/recipe-address'

const DEBOUNCE_MS = 250

interface RecipeAddressOptions {
  recipe: Recipe
  /** Only what differs from this is written; whoever opens the address must start from the same. */
  base: Recipe
  isOn: boolean
  /** Called once, on arrival, with the settings that the address holds. */
  onRead: (recipe: Recipe) => void
}

/** Keeps the settings in the address bar, so that a link reproduces the view. */
export function useRecipeAddress({ recipe, base, isOn, onRead }: RecipeAddressOptions): void {
  const isRead = useRef(false)
  useEffect(() => {
    if (!isOn || isRead.current) return
    isRead.current = true
    const reading = readRecipeAddress(window.location.search, base)
    if (withRecipeAddress('', reading.recipe, base) !== '') onRead(reading.recipe)
  }, [isOn, base, onRead])

  useEffect(() => {
    if (!isOn) return
    const timer = setTimeout(() => {
      const search = withRecipeAddress(window.location.search, recipe, base)
      if (search === window.location.search) return
      window.history.replaceState(window.history.state, '', window.location.pathname + search + window.location.hash)
    }, DEBOUNCE_MS)
    return () => clearTimeout(timer)
  }, [isOn, recipe, base])
}
