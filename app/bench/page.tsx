import type { Metadata } from 'next'
import { PageFrame } from '@/components/shell/page-frame'
import { OpenBench } from '@/components/workspace/open-bench'
import { currentUser } from '@/lib/server/current-user'

export const metadata: Metadata = { title: 'Open bench' }

export default async function BenchPage() {
  return (
    <PageFrame>
      <OpenBench isSignedIn={(await currentUser()) !== null} />
    </PageFrame>
  )
}
