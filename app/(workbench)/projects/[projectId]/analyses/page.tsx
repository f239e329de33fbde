import type { Metadata } from 'next'
import { AnalysesScreen } from '@/components/lists/analyses-screen'
import { SwrFallback } from '@/components/shell/swr-fallback'
import { requireProjectPage } from '@/lib/server/current-user'
import { loadAnalyses } from '@/lib/server/load-analyses'
import { everyPage } from '../every-page'

export const metadata: Metadata = { title: 'Analyses' }

export default async function AnalysesPage({ params }: PageProps<'/projects/[projectId]/analyses'>) {
  const { projectId } = await params
  const { access } = await requireProjectPage(projectId, `/projects/${projectId}/analyses`)
  const analyses = await everyPage(
    (page) => loadAnalyses(access, page),
    (page) => page.analyses,
  )
  return (
    <SwrFallback fallback={{ [`/api/projects/${projectId}/analyses`]: analyses }}>
      <AnalysesScreen projectId={projectId} />
    </SwrFallback>
  )
}
