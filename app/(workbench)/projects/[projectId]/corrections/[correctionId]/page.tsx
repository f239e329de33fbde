import type { Metadata } from 'next'
import { CorrectionScreen } from '@/components/corrections/correction-screen'
import { SwrFallback } from '@/components/shell/swr-fallback'
import { assertAddressId, orNotFound, requireProjectPage } from '@/lib/server/current-user'
import { loadCorrection } from '@/lib/server/load-analyses'

export const metadata: Metadata = { title: 'Correction table' }

export default async function CorrectionPage({
  params,
}: PageProps<'/projects/[projectId]/corrections/[correctionId]'>) {
  const { projectId, correctionId } = await params
  const path = `/projects/${projectId}/corrections/${correctionId}`
  const { access } = await requireProjectPage(projectId, path)
  assertAddressId(correctionId)
  const correction = await orNotFound(loadCorrection(access, correctionId))
  return (
    <SwrFallback fallback={{ [`/api${path}`]: correction }}>
      <CorrectionScreen projectId={projectId} correctionId={correctionId} />
    </SwrFallback>
  )
}
