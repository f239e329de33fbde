import type { Metadata } from 'next'
import { CorrectionsScreen } from '@/components/lists/corrections-screen'
import { SwrFallback } from '@/components/shell/swr-fallback'
import { requireProjectPage } from '@/lib/server/current-user'
import { loadCorrections } from '@/lib/server/load-analyses'
import { everyPage } from '../every-page'

export const metadata: Metadata = { title: 'Corrections' }

export default async function CorrectionsPage({ params }: PageProps<'/projects/[projectId]/corrections'>) {
  const { projectId } = await params
  const { access } = await requireProjectPage(projectId, `/projects/${projectId}/corrections`)
  const corrections = await everyPage(
    (page) => loadCorrections(access, page),
    (page) => page.corrections,
  )
  return (
    <SwrFallback fallback={{ [`/api/projects/${projectId}/corrections`]: corrections }}>
      <CorrectionsScreen projectId={projectId} />
    </SwrFallback>
  )
}
