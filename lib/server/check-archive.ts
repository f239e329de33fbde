import 'server-only'
import { createHash } from 'node:crypto'
import { writeFile } from 'node:fs/promises'
import { join } from 'node:path'
import type { z } from 'zod'
import { readColumns } from '@/db/read-columns'
import { MAX_FILE_BYTES } from '@/lib/formats/limits'
import {
  anyManifestSchema,
  ARCHIVE_SCHEMAS,
  ARCHIVE_VERSION,
  type ArchiveProject,
  type ArchiveRun,
  type ArchiveSchemaName,
} from '@/lib/schemas/archive'
import { ArchiveFaults, badArchive } from './archive-fault'
import type { ArchiveFile } from './archive-file'
import { AppError } from './errors'
import { isStorable } from './storable'

/** Largest JSON or text file in an archive; a saved analysis is some 100 kB. */
const MOST_TEXT_BYTES = 32 * 1024 * 1024

type Parsed<Name extends ArchiveSchemaName> = z.output<(typeof ARCHIVE_SCHEMAS)[Name]>

export interface CheckedRun {
  folder: string
  run: ArchiveRun
  /** Where the packed columns that were read of it lie; null for a run that was not read. */
  columnsPath: string | null
}

/** An archive that was found whole and sound; recipes, results and tables are read again when they are written. */
export interface CheckedArchive {
  project: ArchiveProject
  runs: CheckedRun[]
  /** Folders in the archive's order. */
  analyses: { folder: string; run: string }[]
  corrections: { folder: string; analysis: string }[]
  events: Parsed<'trail'>['events']
}

const EXPECTED: { pattern: RegExp; schema: ArchiveSchemaName | null }[] = [
  { pattern: /^(README\.txt|people\.csv|trail\.csv|schemas\/[a-z]+\.schema\.json)$/, schema: null },
  { pattern: /^project\.json$/, schema: 'project' },
  { pattern: /^trail\.json$/, schema: 'trail' },
  { pattern: /^runs\/[^/]+\/run\.json$/, schema: 'run' },
  { pattern: /^runs\/[^/]+\/original\/[^/]+$/, schema: null },
  { pattern: /^analyses\/[^/]+\/analysis\.json$/, schema: 'analysis' },
  { pattern: /^analyses\/[^/]+\/notes\.json$/, schema: 'notes' },
  { pattern: /^corrections\/[^/]+\/correction\.json$/, schema: 'correction' },
  { pattern: /^corrections\/[^/]+\/table\.(csv|json)$/, schema: null },
]

const folderOf = (path: string) => path.split('/').slice(0, 2).join('/')
const isOriginal = (path: string) => path.startsWith('runs/') && path.includes('/original/')

interface Bytes {
  bytes: Buffer
  sha256: string
}

async function readBytes(archive: ArchiveFile, path: string, mostBytes: number): Promise<Bytes> {
  const hash = createHash('sha256')
  const parts: Uint8Array[] = []
  await archive.read(path, mostBytes, (part) => {
    hash.update(part)
    parts.push(part)
  })
  return { bytes: Buffer.concat(parts), sha256: hash.digest('hex') }
}

/** A recording, which may have 64 MB: written into its place at once, so that it is not in memory twice. */
async function readRecording(archive: ArchiveFile, path: string, byteLength: number): Promise<Bytes> {
  const hash = createHash('sha256')
  const bytes = Buffer.alloc(Math.min(byteLength, MAX_FILE_BYTES))
  let length = 0
  await archive.read(path, bytes.length, (part) => {
    hash.update(part)
    bytes.set(part, length)
    length += part.byteLength
  })
  return { bytes: bytes.subarray(0, length), sha256: hash.digest('hex') }
}

/** @throws {AppError} bad-archive that names the entry and the place in it */
function parseJson<Schema extends z.ZodType>(path: string, bytes: Buffer, schema: Schema) {
  let raw: unknown
  try {
    raw = JSON.parse(new TextDecoder('utf-8', { fatal: true }).decode(bytes))
  } catch {
    throw badArchive(`${path} is not readable JSON. Download the archive again, and bring it in unchanged.`)
  }
  if (!isStorable(raw)) {
    throw badArchive(`${path} holds a text or a number that can’t be kept. Bring in the archive as it was downloaded.`)
  }
  const parsed = schema.safeParse(raw)
  if (parsed.success) return { raw, value: parsed.data }
  const { path: place, message } = parsed.error.issues[0]
  throw badArchive(
    `${path}, at ${place.join('.') || 'its top'}: ${message}. Bring in the archive as it was downloaded.`,
  )
}

/** A JSON file of an archive that was checked before, with what its schema lets through and does not name still in it. */
export async function readArchiveJson<Name extends ArchiveSchemaName>(
  archive: ArchiveFile,
  path: string,
  schema: Name,
): Promise<{ raw: unknown; value: Parsed<Name> }> {
  const { bytes } = await readBytes(archive, path, MOST_TEXT_BYTES)
  return parseJson(path, bytes, ARCHIVE_SCHEMAS[schema] as unknown as z.ZodType<Parsed<Name>>)
}

/** An original file as a whole. */
export async function readOriginal(archive: ArchiveFile, { file }: ArchiveRun): Promise<Buffer> {
  return (await readRecording(archive, file.path, file.byteLength)).bytes
}

async function readManifest(archive: ArchiveFile): Promise<Parsed<'manifest'>> {
  const path = 'manifest.json'
  if (!archive.has(path)) {
    throw badArchive(
      'There is no manifest.json at the top of this ZIP, so it is no project archive. Choose the file that “Download everything” gave you, unchanged.',
    )
  }
  const { bytes } = await readBytes(archive, path, MOST_TEXT_BYTES)
  const { version, madeBy } = parseJson(path, bytes, anyManifestSchema).value
  if (version !== ARCHIVE_VERSION) {
    const maker = madeBy ? `${madeBy.name} ${madeBy.version}` : 'another version'
    throw badArchive(
      `This archive has version ${version} and was made by ${maker}; this server reads version ${ARCHIVE_VERSION}. Bring it in where it was made, or have this server brought up to date.`,
    )
  }
  return parseJson(path, bytes, ARCHIVE_SCHEMAS.manifest).value
}

/** What is listed is there, what is there is listed, and nothing else than an archive holds. */
function checkList(archive: ArchiveFile, manifest: Parsed<'manifest'>, faults: ArchiveFaults): void {
  const listed = new Set<string>()
  for (const { path } of manifest.files) {
    if (listed.has(path)) faults.add(path, 'it is listed twice in manifest.json.')
    listed.add(path)
    if (!archive.has(path)) faults.add(path, 'it is missing. Download the archive again.')
    else if (!EXPECTED.some(({ pattern }) => pattern.test(path))) faults.add(path, 'no archive holds such a file.')
  }
  for (const path of archive.paths) {
    if (path !== 'manifest.json' && !listed.has(path)) {
      faults.add(path, 'manifest.json does not list it. Take it out, or download the archive again.')
    }
  }
  for (const path of ['project.json', 'trail.json']) {
    if (!listed.has(path)) faults.add(path, 'it is missing. Download the archive again.')
  }
  faults.throwIfAny()
}

interface Contents {
  project: ArchiveProject | null
  events: Parsed<'trail'>['events']
  runs: Map<string, ArchiveRun>
  analyses: Map<string, { run: string }>
  corrections: Map<string, { analysis: string }>
  notes: Set<string>
}

async function readContents(
  archive: ArchiveFile,
  manifest: Parsed<'manifest'>,
  faults: ArchiveFaults,
): Promise<Contents> {
  const contents: Contents = {
    project: null,
    events: [],
    runs: new Map(),
    analyses: new Map(),
    corrections: new Map(),
    notes: new Set(),
  }
  for (const { path, byteLength, sha256 } of manifest.files) {
    if (isOriginal(path)) continue
    const file = await readBytes(archive, path, Math.min(byteLength, MOST_TEXT_BYTES))
    if (file.sha256 !== sha256 || file.bytes.length !== byteLength) {
      faults.add(path, 'it is not as it was written: its SHA-256 differs. Download the archive again.')
      continue
    }
    try {
      takeContent(contents, path, file.bytes)
    } catch (error) {
      if (!(error instanceof AppError)) throw error
      faults.add(path, error.message.replace(`${path} `, 'it ').replace(`${path}, `, ''))
    }
  }
  faults.throwIfAny()
  return contents
}

function takeContent(contents: Contents, path: string, bytes: Buffer): void {
  const schema = EXPECTED.find(({ pattern }) => pattern.test(path))?.schema
  const folder = folderOf(path)
  switch (schema) {
    case 'project':
      contents.project = parseJson(path, bytes, ARCHIVE_SCHEMAS.project).value
      break
    case 'trail':
      contents.events = parseJson(path, bytes, ARCHIVE_SCHEMAS.trail).value.events
      break
    case 'run':
      contents.runs.set(folder, parseJson(path, bytes, ARCHIVE_SCHEMAS.run).value)
      break
    case 'analysis':
      contents.analyses.set(folder, { run: parseJson(path, bytes, ARCHIVE_SCHEMAS.analysis).value.run })
      break
    case 'notes':
      parseJson(path, bytes, ARCHIVE_SCHEMAS.notes)
      contents.notes.add(folder)
      break
    case 'correction': {
      const { analysis } = parseJson(path, bytes, ARCHIVE_SCHEMAS.correction).value
      contents.corrections.set(folder, { analysis })
      break
    }
  }
}

/** Whatever names another thing names one that is there. */
function checkReferences(contents: Contents, manifest: Parsed<'manifest'>, faults: ArchiveFaults): void {
  const { runs, analyses, corrections, notes } = contents
  const originals = new Set(manifest.files.map(({ path }) => path).filter(isOriginal))
  for (const [folder, { file }] of runs) {
    const isOwn = isOriginal(file.path) && folderOf(file.path) === folder
    if (!isOwn || !originals.delete(file.path)) {
      faults.add(`${folder}/run.json`, `it names the file “${file.path}”, which is not in its folder.`)
    }
  }
  for (const path of originals) faults.add(path, 'no run.json names it.')
  for (const [folder, { run }] of analyses) {
    if (!runs.has(run)) faults.add(`${folder}/analysis.json`, `it is of “${run}”, which is not in the archive.`)
    if (!notes.delete(folder)) faults.add(`${folder}/notes.json`, 'it is missing. Download the archive again.')
  }
  for (const folder of notes) faults.add(`${folder}/notes.json`, 'there is no analysis.json beside it.')
  for (const [folder, { analysis }] of corrections) {
    if (!analyses.has(analysis)) {
      faults.add(`${folder}/correction.json`, `it was made from “${analysis}”, which is not in the archive.`)
    }
  }
  faults.throwIfAny()
}

/** The original files: their hashes, and that reading them once more gives the samples that the analyses speak of. */
async function checkOriginals(
  archive: ArchiveFile,
  { contents, manifest, folder: temporary }: { contents: Contents; manifest: Parsed<'manifest'>; folder: string },
  faults: ArchiveFaults,
): Promise<CheckedRun[]> {
  const listed = new Map(manifest.files.map((file) => [file.path, file]))
  const checked: CheckedRun[] = []
  for (const [folder, run] of contents.runs) {
    const { path, byteLength, sha256 } = run.file
    const { bytes, sha256: found } = await readRecording(archive, path, byteLength)
    if (bytes.length !== byteLength || found !== sha256 || found !== listed.get(path)?.sha256) {
      faults.add(path, 'it is not as it was written: its SHA-256 differs. Download the archive again.')
      continue
    }
    let columnsPath: string | null = null
    if (run.importSettings && run.samplesSha256) {
      const outcome = await readColumns(bytes, run.importSettings)
      if (!outcome.ok) {
        faults.add(path, `the file of “${run.name}” can’t be read as it was: ${outcome.fault.message}`)
        continue
      }
      if (outcome.samplesSha256 !== run.samplesSha256 || outcome.rowCount !== run.rowCount) {
        faults.add(
          path,
          `reading the file of “${run.name}” gives other samples than its analyses speak of. Bring the archive in where it was made.`,
        )
        continue
      }
      columnsPath = join(temporary, `columns-${checked.length}`)
      await writeFile(columnsPath, outcome.compressed, { mode: 0o600 })
    }
    checked.push({ folder, run, columnsPath })
  }
  faults.throwIfAny()
  return checked
}

/**
 * Reads the whole archive before anything of it is written: every entry listed and hashed, every JSON by its schema, every
 * reference, every recording as it was read. Columns that were read wait in `folder`.
 *
 * @throws {AppError} bad-archive that names the entries at fault
 */
export async function checkArchive(archive: ArchiveFile, folder: string): Promise<CheckedArchive> {
  const faults = new ArchiveFaults()
  const manifest = await readManifest(archive)
  checkList(archive, manifest, faults)
  const contents = await readContents(archive, manifest, faults)
  checkReferences(contents, manifest, faults)
  const runs = await checkOriginals(archive, { contents, manifest, folder }, faults)
  const { project, events, analyses, corrections } = contents
  if (!project) throw badArchive('project.json is missing. Download the archive again.')
  return {
    project,
    runs,
    events,
    analyses: [...analyses].map(([path, analysis]) => ({ folder: path, ...analysis })),
    corrections: [...corrections].map(([path, correction]) => ({ folder: path, ...correction })),
  }
}
