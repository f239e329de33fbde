import 'server-only'
import { database } from '@/db'
import { countOpening, findSharedReport, openShareLink, type ShareAccess } from '@/db/queries/shared-reports'
import { fullAnalysisResultSchema } from '@/lib/schemas/analysis-result'
import { shareReportSchema, type ShareReport } from '@/lib/schemas/share'
import { AppError, STATUS, toAppError } from './errors'
import { plain } from './plain'
import { addressLimit, takeAttempt } from './rate-limit'

/** An expiry in the past would make a link that never opens. */
export function assertLaterThanNow(expiresAt: string | null): void {
  if (expiresAt === null || new Date(expiresAt).getTime() > Date.now()) return
  throw new AppError('not-valid', 'Some of this can’t be taken as it is', {
    fields: { expiresAt: 'This moment has passed. Choose a later one.' },
  })
}

/** The report that a link opens. */
export async function loadShareReport(access: ShareAccess): Promise<ShareReport> {
  const report = await findSharedReport(database(), access)
  const result = fullAnalysisResultSchema.safeParse(report.subject.result)
  return plain(shareReportSchema, { ...report, subject: { ...report.subject, result: result.data ?? null } })
}

/** The same for its page, counted as one more opening. @throws {Refusal} as openShareLink */
export async function visitShareReport(token: string): Promise<ShareReport> {
  const access = await openShareLink(database(), token)
  const report = await loadShareReport(access)
  await countOpening(database(), access)
  return report
}

/** How the proxy tells the page what it was answered with. */
export const SHARE_STATUS_HEADER = 'x-share-status'

export type ShareStatus = 200 | 404 | 410 | 429

/**
 * The status that the page of a link has to be answered with. A page can't set its own, so the proxy asks before it is
 * rendered, and counts the visit against guessing.
 */
export async function shareStatus(request: Request, token: string): Promise<ShareStatus> {
  try {
    await takeAttempt(addressLimit('share address', request))
    await openShareLink(database(), token)
    return 200
  } catch (error) {
    const known = toAppError(error)
    if (known?.code === 'not-found' || known?.code === 'link-ended' || known?.code === 'too-many-attempts') {
      return STATUS[known.code]
    }
    throw error
  }
}
