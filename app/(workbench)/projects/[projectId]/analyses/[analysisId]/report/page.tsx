import type { Metadata } from 'next'
import { headers } from 'next/headers'
import { ReportSheet } from '@/components/report/report-sheet'
import { Crumbs } from '@/components/shell/page-heading'
import { paperStyle } from '@/lib/paper-style'
import { assertAddressId, orNotFound, requireProjectPage } from '@/lib/server/current-user'
import { loadProject } from '@/lib/server/load-projects'
import { loadReportSubject } from '@/lib/server/load-report'

export const metadata: Metadata = { title: 'Report' }

/** The report of a saved analysis for members, who need no link to read and print it. */
export default async function ReportPage({ params }: PageProps<'/projects/[projectId]/analyses/[analysisId]/report'>) {
  const { projectId, analysisId } = await params
  const address = `/projects/${projectId}/analyses/${analysisId}`
  const { access } = await requireProjectPage(projectId, `${address}/report`)
  assertAddressId(analysisId)
  const [project, { subject, runId }] = await Promise.all([
    loadProject(access),
    orNotFound(loadReportSubject(access, analysisId)),
  ])
  const paper = paperStyle({
    topLeft: `Periodic error of ${project.name}`,
    topRight: subject.name,
    bottomLeft: 'Turnwright',
  })
  const nonce = (await headers()).get('x-nonce') ?? undefined
  return (
    <>
      <style nonce={nonce} suppressHydrationWarning>
        {paper}
      </style>
      <div className="no-print mx-auto -mb-2 w-full max-w-[48rem] text-sm text-soft">
        <Crumbs
          crumbs={[
            { label: project.name, href: `/projects/${projectId}` },
            { label: 'Analyses', href: `/projects/${projectId}/analyses` },
            { label: subject.name, href: address },
            { label: 'Report' },
          ]}
        />
      </div>
      <ReportSheet
        mountName={project.name}
        subject={subject}
        sharing={null}
        columnsUrl={`/api/projects/${projectId}/runs/${runId}/columns`}
      />
    </>
  )
}
