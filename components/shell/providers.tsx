'use client'

import '@/lib/client/zod-without-eval'
import type { ReactNode } from 'react'
import { SWRConfig } from 'swr'

/** What every page of the browser needs once. */
export function Providers({ children }: { children: ReactNode }) {
  return <SWRConfig value={{ revalidateOnFocus: false, shouldRetryOnError: false }}>{children}</SWRConfig>
}
