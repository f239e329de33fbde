import type { Metadata } from 'next'
import { CorrectionsScreen } from '@/components/lists/corrections-screen'
import { SwrFallback } from '@/components/shell/swr-fallback'
import { lenientQuery, listSearch, correctionQuerySchema } from '@/lib/schemas/lists'
import { requireProjectPage } from '@/lib/server/current-user'
import { firstView } from '@/lib/server/first-view'
import { loadCorrections } from '@/lib/server/load-analyses'

export const metadata: Metadata = { title: 'Corrections' }

export default async function CorrectionsPage({
  params,
  searchParams,
}: PageProps<'/projects/[projectId]/corrections'>) {
  const { projectId } = await params
  const { access } = await requireProjectPage(projectId, `/projects/${projectId}/corrections`)
  const query = lenientQuery(correctionQuerySchema, await searchParams)
  const list = await firstView(loadCorrections(access, query))
  return (
    <SwrFallback
      fallback={{ [`/api/projects/${projectId}/corrections${listSearch(correctionQuerySchema, query)}`]: list }}
    >
      <CorrectionsScreen projectId={projectId} />
    </SwrFallback>
  )
}
