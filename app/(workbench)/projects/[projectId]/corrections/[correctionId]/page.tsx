import type { Metadata } from 'next'
import { notFound } from 'next/navigation'
import { z } from 'zod'
import { CorrectionScreen } from '@/components/corrections/correction-screen'
import { SwrFallback } from '@/components/shell/swr-fallback'
import { orNotFound, requireProjectPage } from '@/lib/server/current-user'
import { loadCorrection } from '@/lib/server/load-analyses'

export const metadata: Metadata = { title: 'Correction table' }

export default async function CorrectionPage({
  params,
}: PageProps<'/projects/[projectId]/corrections/[correctionId]'>) {
  const { projectId, correctionId } = await params
  const path = `/projects/${projectId}/corrections/${correctionId}`
  const { access } = await requireProjectPage(projectId, path)
  if (!z.uuid().safeParse(correctionId).success) notFound()
  const correction = await orNotFound(loadCorrection(access, correctionId))
  return (
    <SwrFallback fallback={{ [`/api${path}`]: correction }}>
      <CorrectionScreen projectId={projectId} correctionId={correctionId} />
    </SwrFallback>
  )
}
