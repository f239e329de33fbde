import 'server-only'
import { ZodError } from 'zod'
import { Refusal } from '@/db/queries/refusal'
import type { ImportFault } from '@/lib/formats/types'

/** A file that can't be read is answered with its fault's own code. */
const FILE_FAULT_STATUS = {
  empty: 422,
  binary: 422,
  'no-columns': 422,
  'column-missing': 422,
  'not-a-number': 422,
  'bad-time': 422,
  'time-goes-back': 422,
  'few-rows': 422,
  constant: 422,
  'too-many-faults': 422,
} as const satisfies Record<Exclude<ImportFault['code'], 'too-large'>, number>

/** Every code that a handler may answer with, and its HTTP status. */
export const STATUS = {
  'bad-request': 400,
  'not-signed-in': 401,
  'wrong-credentials': 401,
  'wrong-origin': 403,
  forbidden: 403,
  'not-found': 404,
  'upload-stalled': 408,
  'changed-meanwhile': 409,
  'in-use': 409,
  archived: 409,
  'last-owner': 409,
  'already-member': 409,
  'already-invited': 409,
  'link-ended': 410,
  'run-not-ready': 409,
  'correction-was-on': 409,
  'upload-incomplete': 400,
  'too-large': 413,
  'not-valid': 422,
  'bad-archive': 422,
  'no-table': 422,
  'sense-not-confirmed': 422,
  'too-many-attempts': 429,
  ...FILE_FAULT_STATUS,
  unknown: 500,
  busy: 503,
} as const

export type ErrorCode = keyof typeof STATUS

export interface ErrorDetails {
  fields?: Record<string, string>
  changedBy?: string
  changedAt?: string
  current?: unknown
  /** Where the fault of a file lies. */
  row?: number | null
  column?: string | null
  retryAfterSeconds?: number
}

/** Something that we refuse for a reason that the asker may read. */
export class AppError extends Error {
  constructor(
    readonly code: ErrorCode,
    message: string,
    readonly details: ErrorDetails = {},
  ) {
    super(message)
    this.name = 'AppError'
  }
}

export function notSignedIn(): AppError {
  return new AppError(
    'not-signed-in',
    'You are not signed in, or no longer. Sign in, in another tab if you have unsaved work here, and try again.',
  )
}

/** The same for an unknown address, a wrong password, and one that was right until a moment ago. */
export function wrongCredentials(): AppError {
  return new AppError('wrong-credentials', 'The e-mail address or the password is not right')
}

export function unreadableFile({ code, message, row, column }: ImportFault): AppError {
  return new AppError(code, message, { row, column })
}

/** Gives known refusals the one form that is answered; undefined for what nobody foresaw. */
export function toAppError(error: unknown): AppError | undefined {
  if (error instanceof AppError) return error
  if (error instanceof ZodError) {
    const fields: Record<string, string> = {}
    for (const { path, message } of error.issues) fields[path.join('.')] ??= message
    return new AppError('not-valid', 'Some of this can’t be taken as it is', { fields })
  }
  if (!(error instanceof Refusal)) return undefined
  const { reason, message } = error
  switch (reason.kind) {
    case 'unknown':
      return new AppError('not-found', message)
    case 'forbidden':
      return new AppError('forbidden', message)
    case 'in-use':
    case 'archived':
    case 'last-owner':
    case 'already-member':
    case 'link-ended':
      return new AppError(reason.kind, message)
    case 'not-valid':
      return new AppError('not-valid', message, { fields: reason.fields })
    case 'changed': {
      const { change, current } = reason
      return new AppError('changed-meanwhile', message, {
        changedBy: change?.by,
        changedAt: change?.at.toISOString(),
        current,
      })
    }
    case 'already-invited':
      return new AppError('already-invited', message, { current: reason.current })
  }
}

/** The one form of every refusal (errorAnswerSchema); what nobody foresaw is logged and answered blandly. */
export function errorResponse(error: unknown): Response {
  const known = toAppError(error)
  if (!known) console.error(error)
  const { code, message, details } =
    known ?? new AppError('unknown', 'Something went wrong on the server. Nothing was changed; try again in a moment.')
  const { retryAfterSeconds, ...rest } = details
  const headers = new Headers({ 'cache-control': 'no-store' })
  if (retryAfterSeconds !== undefined) headers.set('retry-after', String(retryAfterSeconds))
  return Response.json({ error: { code, message, ...rest } }, { status: STATUS[code], headers })
}
