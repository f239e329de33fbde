import type { ReactNode } from 'react'
import { PageFrame } from '@/components/shell/page-frame'

export default function WorkbenchLayout({ children }: { children: ReactNode }) {
  return <PageFrame>{children}</PageFrame>
}
