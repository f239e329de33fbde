'use client'

import type { ReactNode } from 'react'
import { SWRConfig } from 'swr'

/** What the server has read for this page, by address, so that the first view needs no second request. */
export function SwrFallback({ fallback, children }: { fallback: Record<string, unknown>; children: ReactNode }) {
  return (
    <SWRConfig value={(parent) => ({ ...parent, fallback: { ...parent?.fallback, ...fallback } })}>
      {children}
    </SWRConfig>
  )
}
