'use client'

import { useSyncExternalStore } from 'react'
import { isTheme, themeCookieName, type Theme } from './theme-names'

const oneYearSeconds = 365 * 24 * 3600
const darkQuery = '(prefers-color-scheme: dark)'

/** Shows the theme at once and remembers it; without a remembered theme Day and Dusk follow the system. */
export function chooseTheme(theme: Theme): void {
  document.documentElement.dataset.theme = theme
  document.cookie = `${themeCookieName}=${theme}; path=/; max-age=${oneYearSeconds}; samesite=lax`
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
