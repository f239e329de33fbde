import 'server-only'
import { readFile } from 'node:fs/promises'
import { join } from 'node:path'
import type { Transaction } from 'kysely'
import { database } from '@/db'
import type { ProjectAccess } from '@/db/queries/access'
import { insertAuditEvent } from '@/db/queries/audit'
import { copyAnalysis, copyCorrection, copyProject, copyRun, copyTrail, risingIds } from '@/db/queries/project-copy'
import { findProject } from '@/db/queries/projects'
import { insertRunFile } from '@/db/queries/run-files'
import { lockUser } from '@/db/queries/users'
import type { Database } from '@/db/schema'
import type { ArchiveAnalysis, ArchiveCorrection } from '@/lib/schemas/archive'
import { badArchive } from './archive-fault'
import { ArchiveFile, inTemporaryFolder, receiveArchive } from './archive-file'
import { checkArchive, readArchiveJson, readOriginal, type CheckedArchive } from './check-archive'
import { notSignedIn } from './errors'
import { createGate } from './gate'
import { accountLimit, addressLimit, takeAttempt } from './rate-limit'

/** Up to 1 GB on disk, and in memory a file, its columns and what they are packed into. */
const gate = createGate(2, 'Other archives are being brought in just now. Try again in a few minutes.')

/**
 * Receives an archive, checks all of it, and only then writes it as a new project of this person. Refused or broken off,
 * nothing stays, neither on disk nor in the database.
 */
export async function importProject(request: Request, userId: string) {
  await takeAttempt(accountLimit('archive import account', userId))
  await takeAttempt(addressLimit('archive import address', request))
  return gate(() =>
    inTemporaryFolder(async (folder) => {
      const path = join(folder, 'archive.zip')
      await receiveArchive(request, path)
      const archive = await ArchiveFile.open(path)
      try {
        const checked = await checkArchive(archive, folder)
        return await database()
          .transaction()
          .execute((trx) => writeProject(trx, { archive, checked, userId }))
      } finally {
        await archive.close()
      }
    }),
  )
}

interface Copy {
  archive: ArchiveFile
  checked: CheckedArchive
  userId: string
}

async function writeProject(trx: Transaction<Database>, { archive, checked, userId }: Copy) {
  const access = await copyProject(trx, userId, checked.project)
  const runIds = await writeRuns(trx, access, { archive, checked })
  const analysisIds = await writeAnalyses(trx, access, { archive, checked, runIds })
  const ids = risingIds(checked.corrections.length)
  for (const [index, { folder, analysis }] of checked.corrections.entries()) {
    const { raw, value } = await readArchiveJson(archive, `${folder}/correction.json`, 'correction')
    // As it was written: the schema keeps only what it names of what lies deeper.
    const correction = { ...value, table: (raw as ArchiveCorrection).table }
    await copyCorrection(trx, access, { id: ids[index], analysisId: analysisIds.get(analysis)!, correction })
  }
  await copyTrail(trx, access, checked.events)
  await insertAuditEvent(trx, access, { action: 'project.import', subject: checked.project.name })
  // Last, since it may have taken minutes: an account that was deleted meanwhile gets no project.
  if (!(await lockUser(trx, userId))) throw notSignedIn()
  return findProject(trx, access)
}

type Ids = Map<string, string>

async function writeRuns(
  trx: Transaction<Database>,
  access: ProjectAccess<'edit'>,
  { archive, checked }: Omit<Copy, 'userId'>,
): Promise<Ids> {
  const ids = risingIds(checked.runs.length)
  for (const [index, { folder, run, columnsPath }] of checked.runs.entries()) {
    const id = ids[index]
    const stored = await insertRunFile(trx, id, inOnePart(await readOriginal(archive, run)))
    if (stored.sha256 !== run.file.sha256) throw badArchive(`${folder}: its file changed while it was brought in.`)
    await copyRun(trx, access, { id, run, compressed: columnsPath === null ? null : await readFile(columnsPath) })
  }
  return new Map(checked.runs.map(({ folder }, index) => [folder, ids[index]]))
}

async function writeAnalyses(
  trx: Transaction<Database>,
  access: ProjectAccess<'edit'>,
  { archive, checked, runIds }: Omit<Copy, 'userId'> & { runIds: Ids },
): Promise<Ids> {
  const ids = risingIds(checked.analyses.length)
  for (const [index, { folder, run }] of checked.analyses.entries()) {
    const { raw, value } = await readArchiveJson(archive, `${folder}/analysis.json`, 'analysis')
    const { notes } = (await readArchiveJson(archive, `${folder}/notes.json`, 'notes')).value
    const analysis = { ...value, result: (raw as ArchiveAnalysis).result }
    await copyAnalysis(trx, access, { id: ids[index], runId: runIds.get(run)!, analysis, notes })
  }
  return new Map(checked.analyses.map(({ folder }, index) => [folder, ids[index]]))
}

async function* inOnePart(bytes: Buffer) {
  yield bytes
}
