'use client'

import { usePathname } from 'next/navigation'
import type { ReactNode } from 'react'

/** What belongs to the workbench and not over a report that somebody was sent. */
export function OutsideReports({ children }: { children: ReactNode }) {
  return usePathname().startsWith('/share/') ? null : children
}
