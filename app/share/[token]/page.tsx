import type { Metadata } from 'next'
import { headers } from 'next/headers'
import { notFound } from 'next/navigation'
import { cache } from 'react'
import { Refusal } from '@/db/queries/refusal'
import { ReportSheet } from '@/components/report/report-sheet'
import { PageFrame } from '@/components/shell/page-frame'
import { PageHeading } from '@/components/shell/page-heading'
import { formatDay } from '@/lib/client/dates'
import { paperStyle } from '@/lib/paper-style'
import type { ShareReport } from '@/lib/schemas/share'
import { SHARE_STATUS_HEADER, visitShareReport } from '@/lib/server/share'

type Visit = { kind: 'report'; report: ShareReport } | { kind: 'ended' | 'unknown' | 'too-many' }

/** Asked once per request: the title and the page need it both, and it is counted as one visit. */
const visit = cache(async (token: string): Promise<Visit> => {
  if ((await headers()).get(SHARE_STATUS_HEADER) === '429') return { kind: 'too-many' }
  try {
    return { kind: 'report', report: await visitShareReport(token) }
  } catch (error) {
    if (!(error instanceof Refusal)) throw error
    return { kind: error.reason.kind === 'link-ended' ? 'ended' : 'unknown' }
  }
})

const TITLES = { ended: 'This link has ended', unknown: 'Not found', 'too-many': 'Too many visits' }

export async function generateMetadata({ params }: PageProps<'/share/[token]'>): Promise<Metadata> {
  const visited = await visit((await params).token)
  return {
    title: visited.kind === 'report' ? visited.report.subject.name : TITLES[visited.kind],
    description: 'A report on the periodic error of a telescope mount.',
    robots: { index: false, follow: false },
    referrer: 'no-referrer',
  }
}

export default async function SharePage({ params }: PageProps<'/share/[token]'>) {
  const { token } = await params
  const visited = await visit(token)
  if (visited.kind === 'unknown') notFound()
  if (visited.kind !== 'report') {
    return (
      <PageFrame isNarrow>
        {visited.kind === 'ended' ? (
          <PageHeading
            title="This link has ended"
            lead="Whoever shared this report has taken the link back, or its time is over. Ask them for a new one."
          />
        ) : (
          <PageHeading
            title="Too many visits from your network"
            lead="Reports were opened from there very often in the last minutes. Wait a quarter of an hour, then load this page again."
          />
        )}
      </PageFrame>
    )
  }
  const { mountName, sharedBy, sharedAt, expiresAt, preface, subject } = visited.report
  const paper = paperStyle({
    topLeft: `Periodic error of ${mountName}`,
    topRight: subject.name,
    bottomLeft: `Turnwright, shared by ${sharedBy} on ${formatDay(sharedAt)}`,
  })
  const nonce = (await headers()).get('x-nonce') ?? undefined
  return (
    <PageFrame>
      <style nonce={nonce} suppressHydrationWarning>
        {paper}
      </style>
      <ReportSheet
        mountName={mountName}
        subject={subject}
        sharing={{ by: sharedBy, at: sharedAt, expiresAt, preface }}
        columnsUrl={`/api/share/${token}/columns`}
      />
    </PageFrame>
  )
}
