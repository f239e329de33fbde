'use client'

import { useSyncExternalStore } from 'react'
import { preferencesSchema, THEME_COOKIE } from '@/lib/schemas/preferences'
import { sendJson } from './fetcher'
import { isTheme, type Theme } from './theme-names'

const darkQuery = '(prefers-color-scheme: dark)'

/** Shows the theme at once and remembers it; without a remembered theme Day and Dusk follow the system. */
export function chooseTheme(theme: Theme | null): void {
  if (theme === null) delete document.documentElement.dataset.theme
  else document.documentElement.dataset.theme = theme
  const maxAge = theme === null ? 0 : THEME_COOKIE.maxAgeSeconds
  document.cookie = `${THEME_COOKIE.name}=${theme ?? ''}; path=/; max-age=${maxAge}; samesite=lax`
}

let keeping: Promise<unknown> = Promise.resolve()

/**
 * Keeps the theme with the account as well, one after another so that the last choice wins. Nobody waits for it: the
 * cookie has it already, and at worst another browser learns of it later.
 */
export function keepThemeWithAccount(theme: Theme | null): void {
  keeping = keeping
    .then(() => sendJson('PATCH', '/api/account/preferences', { theme }, preferencesSchema))
    .catch(() => undefined)
}

/** The theme that was chosen in this browser; null: as the system is set. */
export function useChosenTheme(serverTheme: Theme | null): Theme | null {
  return useSyncExternalStore(
    subscribe,
    () => {
      const chosen = document.documentElement.dataset.theme
      return isTheme(chosen) ? chosen : null
    },
    () => serverTheme,
  )
}

/** The theme that is on screen now; on the server, and until the page is alive, what the server was told. */
export function useTheme(serverTheme: Theme = 'day'): Theme {
  return useSyncExternalStore(subscribe, shownTheme, () => serverTheme)
}

function shownTheme(): Theme {
  const chosen = document.documentElement.dataset.theme
  if (isTheme(chosen)) return chosen
  return window.matchMedia(darkQuery).matches ? 'dusk' : 'day'
}

function subscribe(onChange: () => void): () => void {
  const observer = new MutationObserver(onChange)
  observer.observe(document.documentElement, { attributes: true, attributeFilter: ['data-theme'] })
  const media = window.matchMedia(darkQuery)
  media.addEventListener('change', onChange)
  return () => {
    observer.disconnect()
    media.removeEventListener('change', onChange)
  }
}
