import 'server-only'
import type { Transaction } from 'kysely'
import { z } from 'zod'
import type { ProjectAccess } from '@/db/queries/access'
import { anchorOf } from '@/db/queries/notes'
import {
  findAnalysisContent,
  findProjectContent,
  findTableContent,
  listAnalysisContent,
  listCorrectionContent,
  listDriveTrains,
  listNoteContent,
  listPresetContent,
  listRunContent,
  listTrailContent,
} from '@/db/queries/project-content'
import { listMembers } from '@/db/queries/projects'
import { readRunFile } from '@/db/queries/run-files'
import type { Database } from '@/db/schema'
import { numberedFolder, safeFileName } from '@/lib/formats/archive-names'
import { archiveReadme } from '@/lib/formats/archive-readme'
import { writeCorrectionCsv } from '@/lib/formats/correction-csv'
import { writeCorrectionJson } from '@/lib/formats/correction-json'
import { csvRecord } from '@/lib/formats/csv-cells'
import { tableResultSchema } from '@/lib/schemas/analysis-result'
import { ARCHIVE_SCHEMAS, archiveSchemaId, type ArchiveSchemaName } from '@/lib/schemas/archive'

/** One file of a project's archive; a text is there at once, an original file is read while it is written. */
export type ProjectFile =
  { path: string; text: string } | { path: string; byteLength: number; parts: AsyncIterable<Uint8Array> }

type SchemaInput<Name extends ArchiveSchemaName> = Omit<z.input<(typeof ARCHIVE_SCHEMAS)[Name]>, '$schema'>

/** A JSON file of the archive, which names its own schema first. */
export function jsonFile<Name extends ArchiveSchemaName>(path: string, schema: Name, value: SchemaInput<Name>) {
  return { path, text: `${JSON.stringify({ $schema: archiveSchemaId(schema), ...value }, null, 2)}\n` }
}

const iso = (date: Date) => date.toISOString()
const isoOrNull = (date: Date | null) => date && iso(date)

/**
 * Every file of the archive but the manifest, in the archive's order. `trx` should see one state of the database throughout,
 * since this goes on for as long as somebody reads.
 */
export async function* projectFiles(trx: Transaction<Database>, access: ProjectAccess): AsyncGenerator<ProjectFile> {
  const project = await findProjectContent(trx, access)
  yield { path: 'README.txt', text: archiveReadme(project.name) }
  yield* schemaFiles()
  yield await projectFile(trx, access, project)
  const runFolders = new Map<string, string>()
  yield* runFiles(trx, access, runFolders)
  const analysisFolders = new Map<string, string>()
  yield* analysisFiles(trx, access, { runFolders, analysisFolders })
  yield* correctionFiles(trx, access, analysisFolders)
  yield* peopleAndTrail(trx, access)
}

function* schemaFiles(): Generator<ProjectFile> {
  for (const [name, schema] of Object.entries(ARCHIVE_SCHEMAS)) {
    const described = z.toJSONSchema(schema, { io: 'input' })
    const text = JSON.stringify({ $id: archiveSchemaId(name as ArchiveSchemaName), ...described }, null, 2)
    yield { path: `schemas/${name}.schema.json`, text: `${text}\n` }
  }
}

async function projectFile(
  trx: Transaction<Database>,
  access: ProjectAccess,
  { name, version, createdAt, updatedAt, lastImport }: Awaited<ReturnType<typeof findProjectContent>>,
): Promise<ProjectFile> {
  const driveTrains = await listDriveTrains(trx, access)
  const presets = await listPresetContent(trx, access)
  return jsonFile('project.json', 'project', {
    name,
    version,
    createdAt: iso(createdAt),
    updatedAt: iso(updatedAt),
    driveTrains: driveTrains.map(({ author, ...train }) => ({
      ...train,
      createdAt: iso(train.createdAt),
      createdBy: author,
    })),
    opticsPresets: presets.map((preset) => ({
      ...preset,
      createdAt: iso(preset.createdAt),
      updatedAt: iso(preset.updatedAt),
    })),
    lastImport,
  })
}

async function* runFiles(
  trx: Transaction<Database>,
  access: ProjectAccess,
  runFolders: Map<string, string>,
): AsyncGenerator<ProjectFile> {
  const runs = await listRunContent(trx, access)
  for (const [index, run] of runs.entries()) {
    const folder = `runs/${numberedFolder(index, runs.length, run.name)}`
    runFolders.set(run.id, folder)
    const path = `${folder}/original/${safeFileName(run.fileName)}`
    const { byteLength } = run
    yield jsonFile(`${folder}/run.json`, 'run', {
      name: run.name,
      version: run.version,
      file: { path, name: run.fileName, byteLength, sha256: run.fileSha256 },
      status: run.status,
      importSettings: run.importSettings,
      conversion: run.conversion,
      facts: run.facts,
      rowCount: run.rowCount,
      samplesSha256: run.samplesSha256,
      createdAt: iso(run.createdAt),
      createdBy: run.author,
      updatedAt: iso(run.updatedAt),
    })
    yield { path, byteLength, parts: readRunFile(trx, access, run.id) }
  }
}

async function* analysisFiles(
  trx: Transaction<Database>,
  access: ProjectAccess,
  { runFolders, analysisFolders }: Record<'runFolders' | 'analysisFolders', Map<string, string>>,
): AsyncGenerator<ProjectFile> {
  const analyses = await listAnalysisContent(trx, access)
  for (const [index, analysis] of analyses.entries()) {
    const folder = `analyses/${numberedFolder(index, analyses.length, analysis.name)}`
    analysisFolders.set(analysis.id, folder)
    const { recipe, result } = await findAnalysisContent(trx, access, analysis.id)
    yield jsonFile(`${folder}/analysis.json`, 'analysis', {
      name: analysis.name,
      version: analysis.version,
      run: runFolders.get(analysis.runId)!,
      samplesSha256: analysis.samplesSha256,
      recipe,
      // Checked in full before it was kept.
      result: result as SchemaInput<'analysis'>['result'],
      resultVersion: analysis.resultVersion,
      createdAt: iso(analysis.createdAt),
      createdBy: analysis.author,
      updatedAt: iso(analysis.updatedAt),
    })
    const notes = await listNoteContent(trx, access, analysis.id)
    yield jsonFile(`${folder}/notes.json`, 'notes', {
      notes: notes.map((note) => ({
        version: note.version,
        anchor: anchorOf(note.anchorKind, note.anchorValue),
        text: note.text,
        createdAt: iso(note.createdAt),
        createdBy: note.author,
        updatedAt: iso(note.updatedAt),
        updatedBy: note.updatedByName,
        resolvedAt: isoOrNull(note.resolvedAt),
        resolvedBy: note.resolvedByName,
      })),
    })
  }
}

async function* correctionFiles(
  trx: Transaction<Database>,
  access: ProjectAccess,
  analysisFolders: Map<string, string>,
): AsyncGenerator<ProjectFile> {
  const corrections = await listCorrectionContent(trx, access)
  for (const [index, correction] of corrections.entries()) {
    const folder = `corrections/${numberedFolder(index, corrections.length, correction.name)}`
    const { tableResult } = await findTableContent(trx, access, correction.id)
    const table = tableResultSchema.parse(tableResult)
    yield { path: `${folder}/table.csv`, text: writeCorrectionCsv(table, correction) }
    yield { path: `${folder}/table.json`, text: writeCorrectionJson(table, correction) }
    yield jsonFile(`${folder}/correction.json`, 'correction', {
      name: correction.name,
      version: correction.version,
      analysis: analysisFolders.get(correction.analysisId)!,
      kind: correction.kind,
      senseBasis: correction.senseBasis,
      table: tableResult as SchemaInput<'correction'>['table'],
      createdAt: iso(correction.createdAt),
      createdBy: correction.author,
    })
  }
}

async function* peopleAndTrail(trx: Transaction<Database>, access: ProjectAccess): AsyncGenerator<ProjectFile> {
  const members = await listMembers(trx, access)
  const people = members.map(({ displayName, role }) => csvRecord([displayName, role]))
  yield { path: 'people.csv', text: [csvRecord(['name', 'role']), ...people].join('') }
  const events = await listTrailContent(trx, access)
  const rows = events.map(({ at, actorName, action, subject }) => csvRecord([iso(at), actorName, action, subject]))
  yield { path: 'trail.csv', text: [csvRecord(['time (UTC)', 'who', 'action', 'what']), ...rows].join('') }
  yield jsonFile('trail.json', 'trail', {
    events: events.map(({ at, actorName, action, subject }) => ({ at: iso(at), actor: actorName, action, subject })),
  })
}
