import 'server-only'
import { randomUUID } from 'node:crypto'
import { z } from 'zod'
import { database } from '@/db'
import type { ProjectAccess } from '@/db/queries/access'
import { insertAuditEvent } from '@/db/queries/audit'
import { insertRunFile } from '@/db/queries/run-files'
import { insertRun } from '@/db/queries/runs'
import { emptyFault } from '@/lib/formats/faults'
import { MAX_FILE_BYTES } from '@/lib/formats/limits'
import { bodyParts } from './body'
import { AppError, unreadableFile } from './errors'
import { accountLimit, addressLimit, takeAttempt } from './rate-limit'

const LIMITS = {
  mostBytes: MAX_FILE_BYTES,
  tooLargeMessage: 'The file is larger than 64 MB, the most that can be kept. Cut it into parts, or leave out columns.',
}

/** Each upload holds a connection to the database for as long as it lasts. */
const MOST_AT_ONCE = 8
let uploadsNow = 0

/** The last part of a path, without control characters: it is shown, and offered again as a download's name. */
function cleanFileName(text: string): string {
  const name =
    text
      .split(/[\\/]/)
      .at(-1)
      ?.replace(/\p{Cc}/gu, '')
      .trim() ?? ''
  return name.slice(0, 255) || 'recording'
}

const querySchema = z.object({
  name: z.string().trim().max(120, { error: 'At most 120 characters' }).optional(),
  fileName: z.string().max(1000).default('recording').transform(cleanFileName),
})

/** Streams the body into the database as it arrives; refused or broken off, nothing of it stays. */
export async function uploadRun(request: Request, access: ProjectAccess<'edit'>) {
  const { name, fileName } = querySchema.parse(Object.fromEntries(new URL(request.url).searchParams))
  await takeAttempt(accountLimit('upload account', access.userId))
  await takeAttempt(addressLimit('upload address', request))
  if (uploadsNow >= MOST_AT_ONCE) {
    const message = 'Several files are being stored just now. Try again in a moment.'
    throw new AppError('busy', message, { retryAfterSeconds: 10 })
  }
  uploadsNow += 1
  try {
    const id = randomUUID()
    return await database()
      .transaction()
      .execute(async (trx) => {
        const file = await insertRunFile(trx, id, bodyParts(request, LIMITS))
        if (file.byteLength === 0) throw unreadableFile(emptyFault())
        const run = await insertRun(trx, access, { id, name: name || fileName.slice(0, 120), fileName, file })
        await insertAuditEvent(trx, access, { action: 'run.upload', subject: run.name })
        return run
      })
  } finally {
    uploadsNow -= 1
  }
}
