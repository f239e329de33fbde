import 'server-only'
import { randomUUID } from 'node:crypto'
import { z } from 'zod'
import { database } from '@/db'
import type { ProjectAccess } from '@/db/queries/access'
import { insertAuditEvent } from '@/db/queries/audit'
import { deleteRunFile, insertRunFile } from '@/db/queries/run-files'
import { findUnreadTwin, insertRun } from '@/db/queries/runs'
import { emptyFault } from '@/lib/formats/faults'
import { MAX_FILE_BYTES } from '@/lib/formats/limits'
import { bodyParts } from './body'
import { unreadableFile } from './errors'
import { createGate } from './gate'
import { accountLimit, addressLimit, takeAttempt } from './rate-limit'

const LIMITS = {
  mostBytes: MAX_FILE_BYTES,
  tooLargeMessage: 'The file is larger than 64 MB, the most that can be kept. Cut it into parts, or leave out columns.',
}

/** Each upload holds a connection to the database for as long as it lasts. */
const gate = createGate(8, 'Several files are being stored just now. Try again in a moment.')

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
  name: z
    .string()
    .transform((text) => text.replace(/\p{Cc}/gu, '').trim())
    .pipe(z.string().max(120, { error: 'At most 120 characters' }))
    .optional(),
  fileName: z.string().max(1000).default('recording').transform(cleanFileName),
})

/**
 * Streams the body into the database as it arrives; refused or broken off, nothing of it stays. A file that is sent again
 * because the first answer was lost is not stored twice.
 */
export async function uploadRun(request: Request, access: ProjectAccess<'edit'>) {
  const { name, fileName } = querySchema.parse(Object.fromEntries(new URL(request.url).searchParams))
  await takeAttempt(accountLimit('upload account', access.userId))
  await takeAttempt(addressLimit('upload address', request))
  return gate(async () => {
    const id = randomUUID()
    return database()
      .transaction()
      .execute(async (trx) => {
        const file = await insertRunFile(trx, id, bodyParts(request, LIMITS))
        if (file.byteLength === 0) throw unreadableFile(emptyFault())
        const fields = { name: name || fileName.slice(0, 120), fileName, file }
        const twin = await findUnreadTwin(trx, access, fields)
        if (twin) {
          await deleteRunFile(trx, id)
          return twin
        }
        const run = await insertRun(trx, access, { id, ...fields })
        await insertAuditEvent(trx, access, { action: 'run.upload', subject: run.name })
        return run
      })
  })
}
