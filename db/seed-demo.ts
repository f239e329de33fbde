import { randomUUID } from 'node:crypto'
import { gunzipSync } from 'node:zlib'
import { sql, type Kysely, type Transaction } from 'kysely'
import { analyseAtOnce } from '@/lib/analysis/analyse'
import type { AnalysisResult, Recipe } from '@/lib/analysis/types'
import { unpackColumns } from '@/lib/formats/packed-columns'
import {
  DEMO_DRIVE_TRAIN,
  DEMO_OPTICS,
  DEMO_PEOPLE,
  DEMO_PROJECT_NAME,
  demoRuns,
  type DemoPersonKey,
  type DemoRun,
} from '@/lib/simulate/demo'
import { DEMO_CORRECTION, DEMO_NOTES, demoRecipe } from './demo-story'
import { accessProject, type ProjectAccess } from './queries/access'
import { insertAnalysis } from './queries/analyses'
import { insertAuditEvent, type AuditEntry } from './queries/audit'
import { insertCorrection } from './queries/corrections'
import { insertNote } from './queries/notes'
import { insertOpticsPreset } from './queries/optics-presets'
import { insertProject, updateLastImport } from './queries/projects'
import { insertRunFile } from './queries/run-files'
import { insertRun, updateRunColumns } from './queries/runs'
import { readColumns, type ReadColumns } from './read-columns'
import type { Database } from './schema'

/** Ids of the demo's people, whose accounts are there already. */
export type DemoUserIds = Record<DemoPersonKey, string>

interface PreparedRun {
  run: DemoRun
  bytes: Buffer
  read: ReadColumns
  recipe: Recipe
  result: AnalysisResult
}

/**
 * Stores the club's project: people in their roles, optics, eight runs with their files, an analysis of each, notes and a
 * correction table. Does nothing when the owner has the project already, and leaves nothing behind when it fails.
 *
 * @returns whether it was stored now
 */
export async function seedDemo(db: Kysely<Database>, users: DemoUserIds): Promise<boolean> {
  if (await isSeeded(db, users.mira)) return false
  const prepared: PreparedRun[] = []
  for (const run of demoRuns()) prepared.push(await prepare(run))
  return db.transaction().execute(async (trx) => {
    // Two starts at once: the second waits here and then finds the first one's work.
    await sql`select pg_advisory_xact_lock(hashtext('turnwright-demo'))`.execute(trx)
    if (await isSeeded(trx, users.mira)) return false
    const access = await storeProject(trx, users)
    const stored = new Map<string, { analysisId: string; result: AnalysisResult }>()
    for (const [index, item] of prepared.entries()) {
      const analysisId = await storeRun(trx, access[item.run.recordedBy], item, index)
      stored.set(item.run.key, { analysisId, result: item.result })
    }
    for (const [index, note] of DEMO_NOTES.entries()) {
      const { analysisId, result } = stored.get(note.runKey)!
      const anchor = note.anchor(result)
      if (!anchor) continue
      const { id } = await insertNote(trx, access[note.author], {
        analysisId,
        note: { anchor, text: note.text, mentions: [] },
      })
      const settled = note.settledBy ? { resolvedAt: momentOf(index + 1), resolvedBy: users[note.settledBy] } : {}
      await trx
        .updateTable('notes')
        .set({ createdAt: momentOf(index), ...settled })
        .where('id', '=', id)
        .execute()
      for (const key of note.mentions ?? []) {
        await trx.insertInto('noteMentions').values({ noteId: id, userId: users[key] }).execute()
      }
    }
    await storeCorrection(trx, access[DEMO_CORRECTION.author], stored.get(DEMO_CORRECTION.runKey)!)
    const { run } = prepared[prepared.length - 1]
    await updateLastImport(trx, access.mira, { settings: run.importSettings, conversion: run.conversion })
    return true
  })
}

async function isSeeded(db: Kysely<Database>, ownerId: string): Promise<boolean> {
  const project = await db
    .selectFrom('projects')
    .select('id')
    .where('name', '=', DEMO_PROJECT_NAME)
    .where('createdBy', '=', ownerId)
    .executeTakeFirst()
  return project !== undefined
}

/** Reads a run's file as an import would, and analyses the columns that will be stored. */
async function prepare(run: DemoRun): Promise<PreparedRun> {
  const bytes = Buffer.from(run.text, 'utf8')
  const read = await readColumns(bytes, run.importSettings)
  if (!read.ok) throw new Error(`The demo's run ${run.key} cannot be read: ${read.fault.message}`)
  const recipe = demoRecipe(run)
  const outcome = analyseAtOnce(unpackColumns(gunzipSync(read.compressed)).columns, recipe)
  if (!outcome.ok) throw new Error(`The demo's run ${run.key} cannot be analysed: ${outcome.reason}`)
  return { run, bytes, read, recipe, result: outcome.result }
}

type EditorKey = DemoRun['recordedBy']

async function storeProject(trx: Transaction<Database>, users: DemoUserIds) {
  const made = await insertProject(trx, users.mira, { name: DEMO_PROJECT_NAME, driveTrain: DEMO_DRIVE_TRAIN })
  const { projectId } = made
  for (const { key, role } of DEMO_PEOPLE) {
    if (key !== 'mira') await trx.insertInto('memberships').values({ projectId, userId: users[key], role }).execute()
  }
  const accessOf = (key: EditorKey) => accessProject(trx, { userId: users[key], projectId, right: 'edit' })
  const access: Record<EditorKey, ProjectAccess<'edit'>> = {
    mira: await accessOf('mira'),
    tomas: await accessOf('tomas'),
  }
  await writeLog(trx, access.mira, { action: 'project.create', subject: DEMO_PROJECT_NAME }, 0)
  await insertOpticsPreset(trx, access.mira, DEMO_OPTICS)
  return access
}

/** The file byte for byte, what was read of it, and its analysis; answers the analysis's id. */
async function storeRun(
  trx: Transaction<Database>,
  access: ProjectAccess<'edit'>,
  { run, bytes, read, recipe, result }: PreparedRun,
  index: number,
): Promise<string> {
  const runId = randomUUID()
  const file = await insertRunFile(trx, runId, inOnePart(bytes))
  const { version } = await insertRun(trx, access, { id: runId, name: run.name, fileName: run.fileName, file })
  await updateRunColumns(trx, access, {
    runId,
    version,
    settings: run.importSettings,
    conversion: run.conversion,
    facts: run.facts,
    rowCount: read.rowCount,
    samplesSha256: read.samplesSha256,
    compressed: read.compressed,
  })
  const analysis = await insertAnalysis(trx, access, {
    runId,
    name: analysisName(run),
    recipe,
    result: { ...result },
    samplesSha256: read.samplesSha256,
    worm: result.worm,
  })
  await writeLog(trx, access, { action: 'run.upload', subject: run.name }, 2 * index + 1)
  await writeLog(trx, access, { action: 'analysis.save', subject: analysis.name }, 2 * index + 2)
  await trx
    .updateTable('runs')
    .set({ createdAt: momentOf(index) })
    .where('id', '=', runId)
    .execute()
  await trx
    .updateTable('analyses')
    .set({ createdAt: momentOf(index) })
    .where('id', '=', analysis.id)
    .execute()
  return analysis.id
}

async function storeCorrection(
  trx: Transaction<Database>,
  access: ProjectAccess<'edit'>,
  { analysisId, result }: { analysisId: string; result: AnalysisResult },
) {
  const { name } = DEMO_CORRECTION
  if (!result.table) throw new Error(`The demo's correction table cannot be made: ${result.tableReason}`)
  await insertCorrection(trx, access, {
    analysisId,
    name,
    kind: 'stand-alone',
    table: result.table,
    senseBasis: 'proven',
  })
  await writeLog(trx, access, { action: 'correction.create', subject: name }, 100)
}

function analysisName(run: DemoRun): string {
  const [date] = run.name.split(',')
  return `${date}, drift and worm`
}

/** An entry of the log with its place in the story; no two in it have the same action and subject. */
async function writeLog(trx: Transaction<Database>, access: ProjectAccess, entry: AuditEntry, ordinal: number) {
  await insertAuditEvent(trx, access, entry)
  await trx
    .updateTable('auditEvents')
    .set({ at: momentOf(ordinal) })
    .where('projectId', '=', access.projectId)
    .where('action', '=', entry.action)
    .where('subject', '=', entry.subject)
    .execute()
}

/** All is stored in one transaction and hence at one time; lists by time want an order. */
function momentOf(index: number) {
  return sql<Date>`now() + ${index} * interval '1 millisecond'`
}

async function* inOnePart(bytes: Buffer) {
  yield bytes
}
