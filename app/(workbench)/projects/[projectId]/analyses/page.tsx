import type { Metadata } from 'next'
import { AnalysesScreen } from '@/components/lists/analyses-screen'
import { SwrFallback } from '@/components/shell/swr-fallback'
import { lenientQuery, listSearch, analysisQuerySchema } from '@/lib/schemas/lists'
import { requireProjectPage } from '@/lib/server/current-user'
import { firstView } from '@/lib/server/first-view'
import { loadAnalyses } from '@/lib/server/load-analyses'

export const metadata: Metadata = { title: 'Analyses' }

export default async function AnalysesPage({ params, searchParams }: PageProps<'/projects/[projectId]/analyses'>) {
  const { projectId } = await params
  const { access } = await requireProjectPage(projectId, `/projects/${projectId}/analyses`)
  const query = lenientQuery(analysisQuerySchema, await searchParams)
  const list = await firstView(loadAnalyses(access, query))
  return (
    <SwrFallback fallback={{ [`/api/projects/${projectId}/analyses${listSearch(analysisQuerySchema, query)}`]: list }}>
      <AnalysesScreen projectId={projectId} />
    </SwrFallback>
  )
}
