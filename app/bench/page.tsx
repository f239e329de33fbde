import type { Metadata } from 'next'
import { OpenBench } from '@/components/workspace/open-bench'
import { currentUser } from '@/lib/server/current-user'

export const metadata: Metadata = { title: 'Open bench' }

export default async function BenchPage() {
  return <OpenBench isSignedIn={(await currentUser()) !== null} />
}
