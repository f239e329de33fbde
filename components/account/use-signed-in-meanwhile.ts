import { useEffect } from 'react'
import { getJson } from '@/lib/client/fetcher'
import { openAfresh } from '@/lib/client/open-afresh'
import { meSchema } from '@/lib/schemas/api'

const ASK_EVERY_MS = 4000

/** Goes on to `next` once this browser has a session, opened in another tab perhaps; asks only while the page is seen. */
export function useSignedInMeanwhile(next: string): void {
  useEffect(() => {
    let isOver = false
    const ask = async () => {
      if (isOver || document.visibilityState === 'hidden') return
      const answer = await getJson('/api/me', meSchema).catch(() => null)
      if (isOver || !answer?.user) return
      isOver = true
      openAfresh(next)
    }
    const onSeen = () => void ask()
    const timer = setInterval(onSeen, ASK_EVERY_MS)
    document.addEventListener('visibilitychange', onSeen)
    return () => {
      isOver = true
      clearInterval(timer)
      document.removeEventListener('visibilitychange', onSeen)
    }
  }, [next])
}
