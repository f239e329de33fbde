import { useEffect } from 'react'

/** Takes the token of a mail's link out of the address bar and the history: it stays in this page's memory only. */
export function useTokenOutOfAddress(): void {
  useEffect(() => {
    const url = new URL(window.location.href)
    if (!url.searchParams.has('token')) return
    url.searchParams.delete('token')
    window.history.replaceState(window.history.state, '', url)
  }, [])
}
