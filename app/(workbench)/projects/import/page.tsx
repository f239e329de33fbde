import type { Metadata } from 'next'
import { ImportScreen } from '@/components/projects/import-screen'
import { requirePageUser } from '@/lib/server/current-user'

export const metadata: Metadata = { title: 'Bring in an archive' }

export default async function ImportPage() {
  await requirePageUser('/projects/import')
  return <ImportScreen />
}
