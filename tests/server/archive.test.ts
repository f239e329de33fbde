import { mkdtempSync, readdirSync, rmSync, utimesSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { sql } from 'kysely'
import { beforeAll, beforeEach, describe, expect, test } from 'vitest'
import { GET as listAnalyses } from '@/app/api/projects/[projectId]/analyses/route'
import { GET as getAnalysis } from '@/app/api/projects/[projectId]/analyses/[analysisId]/route'
import { GET as listNotes } from '@/app/api/projects/[projectId]/analyses/[analysisId]/notes/route'
import { GET as downloadArchive } from '@/app/api/projects/[projectId]/archive/route'
import { GET as listCorrections } from '@/app/api/projects/[projectId]/corrections/route'
import { GET as getCorrection } from '@/app/api/projects/[projectId]/corrections/[correctionId]/route'
import { GET as getProject } from '@/app/api/projects/[projectId]/route'
import { GET as listEvents } from '@/app/api/projects/[projectId]/audit-events/route'
import { GET as listPresets } from '@/app/api/projects/[projectId]/optics-presets/route'
import { GET as listRuns } from '@/app/api/projects/[projectId]/runs/route'
import { GET as getColumns } from '@/app/api/projects/[projectId]/runs/[runId]/columns/route'
import { GET as getRun } from '@/app/api/projects/[projectId]/runs/[runId]/route'
import { GET as getFile } from '@/app/api/projects/[projectId]/runs/[runId]/file/route'
import { seedDemo } from '@/db/seed-demo'
import { makeNastyProject } from '../support/nasty-project'
import { openTestDatabase } from '../support/test-database'
import { call, signUpPerson, type Person } from '../support/test-server'
import {
  bringIn,
  comparable,
  download,
  replaceFile,
  sha256,
  textOf,
  unzip,
  upload,
  zipped,
  type Files,
} from '../support/archives'

const database = openTestDatabase()

/** Names that differ from project to project; everything else that the API answers must be equal. */
const IDS = new Set(['id', 'projectId', 'runId', 'analysisId', 'driveTrainId', 'authorId'])

function withoutIds(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(withoutIds)
  if (value === null || typeof value !== 'object') return value
  return Object.fromEntries(
    Object.entries(value)
      .filter(([key]) => !IDS.has(key))
      .map(([key, item]) => [key, withoutIds(item)]),
  )
}

/** Everything that the API answers of a project, in the order in which it lists it. */
async function everything(projectId: string, cookie: string) {
  const ask = async (handler: unknown, params: Record<string, string> = {}, query = '') => {
    const response = await call(handler, `/?limit=200${query}`, { projectId, ...params }, { cookie })
    expect(response.status).toBe(200)
    return response
  }
  const json = async (handler: unknown, params?: Record<string, string>, query?: string) =>
    (await ask(handler, params, query)).json()
  const hashOf = async (handler: unknown, params: Record<string, string>) =>
    sha256(new Uint8Array(await (await ask(handler, params)).arrayBuffer()))
  const { runs: listed } = await json(listRuns, {}, '&sort=created')
  const runs = await Promise.all(listed.map(({ id: runId }: { id: string }) => json(getRun, { runId })))
  const { analyses } = await json(listAnalyses)
  const { corrections } = await json(listCorrections)
  const { events } = await json(listEvents)
  const { memberCount, ...project } = await json(getProject)
  expect(memberCount).toBeGreaterThan(0)
  const full = {
    project,
    presets: await json(listPresets),
    runs,
    files: [] as string[],
    columns: [] as string[],
    analyses: [] as unknown[],
    notes: [] as unknown[],
    corrections: [] as unknown[],
    events: events.filter(({ action }: { action: string }) => action !== 'project.import'),
  }
  for (const { id: runId, status } of runs) {
    full.files.push(await hashOf(getFile, { runId }))
    if (status === 'ready') full.columns.push(await hashOf(getColumns, { runId }))
  }
  for (const { id: analysisId } of analyses) {
    full.analyses.push(await json(getAnalysis, { analysisId }))
    full.notes.push(await json(listNotes, { analysisId }))
  }
  for (const { id: correctionId } of corrections) full.corrections.push(await json(getCorrection, { correctionId }))
  return withoutIds(full) as typeof full
}

const temporaryFolders = () => readdirSync(tmpdir()).filter((name) => name.startsWith('turnwright-archive-'))

async function countRows() {
  const counts: Record<string, number> = {}
  for (const table of ['projects', 'runs', 'runFileChunks', 'analyses', 'notes', 'auditEvents'] as const) {
    const { count } = await database.db
      .selectFrom(table)
      .select((eb) => eb.fn.countAll<string>().as('count'))
      .executeTakeFirstOrThrow()
    counts[table] = Number(count)
  }
  return counts
}

let importer: Person

// More archives are brought in here than anybody would within an hour.
beforeEach(async () => {
  await database.db.deleteFrom('rateLimits').execute()
})

beforeAll(async () => {
  importer = await signUpPerson('Ida Importer')
})

/** Mentions name accounts and do not travel. */
function withoutMentions(all: Awaited<ReturnType<typeof everything>>) {
  const strip = (list: unknown) => ({
    notes: (list as { notes: object[] }).notes.map((note) => ({ ...note, mentions: [] })),
  })
  return { ...all, notes: all.notes.map(strip) }
}

async function expectRoundTrip(projectId: string, owner: Person) {
  const first = await download(projectId, owner.cookie)
  const copy = await bringIn(first, importer.cookie)
  const second = await download(copy.id, importer.cookie)
  const [before, after] = [await unzip(first), await unzip(second)]
  expect([...after.keys()]).toEqual([...before.keys()])
  expect(comparable(after)).toEqual(comparable(before))
  const copied = await everything(copy.id, importer.cookie)
  expect(copied).toEqual(withoutMentions(await everything(projectId, owner.cookie)))
  expect(temporaryFolders()).toEqual([])
  return { files: before, copied, copyId: copy.id }
}

test('the demo’s project comes back the same, file by file and answer by answer', async () => {
  const mira = await signUpPerson('Mira')
  const users = {
    mira: mira.id,
    tomas: (await signUpPerson('Tomas')).id,
    ines: (await signUpPerson('Ines')).id,
  }
  await seedDemo(database.db, users)
  const { id } = await database.db
    .selectFrom('projects')
    .select('id')
    .where('createdBy', '=', mira.id)
    .executeTakeFirstOrThrow()
  const { copied } = await expectRoundTrip(id, mira)
  expect(copied.runs).toHaveLength(8)
  expect(copied.analyses).toHaveLength(8)
  expect(copied.corrections).toHaveLength(1)
  expect(copied.notes.flatMap((list) => (list as { notes: unknown[] }).notes).length).toBeGreaterThan(2)
}, 240_000)

describe('a project with everything that is awkward', () => {
  let owner: Person
  let projectId: string
  let archive: Uint8Array<ArrayBuffer>

  beforeAll(async () => {
    ;({ owner, projectId } = await makeNastyProject(database.db))
    archive = await download(projectId, owner.cookie)
  }, 120_000)

  test('comes back the same', async () => {
    const { files, copied, copyId } = await expectRoundTrip(projectId, owner)
    const paths = [...files.keys()]
    expect(paths.filter((path) => /[<>:"\\|?*]|\.\.|[. ](\/|$)/.test(path))).toEqual([])
    expect(paths.filter((path) => /(^|\/)con(\.|\/|$)/i.test(path))).toEqual([])
    expect(new Set(paths.map((path) => path.toLowerCase())).size).toBe(paths.length)
    expect(
      copied.runs.map(({ name }: { name: string }) => name).filter((name: string) => name === 'Zwei gleiche'),
    ).toHaveLength(2)
    expect(copied.runs.map(({ status }: { status: string }) => status)).toContain('uploaded')
    expect(copied.corrections.map((made) => (made as { kind: string }).kind).sort()).toEqual([
      'addition',
      'stand-alone',
    ])
    // The odd figures are there to the last bit.
    expect(JSON.stringify(copied.analyses)).toContain('4.000000000000001')
    expect(JSON.stringify(copied.analyses)).toContain('5e-324')
    expect(JSON.stringify(copied.analyses)).toContain('1.7976931348623157e+308')
    const notes = copied.notes.flatMap((list) => (list as { notes: Record<string, unknown>[] }).notes)
    expect(notes).toContainEqual(
      expect.objectContaining({
        authorName: 'Gone Gunnar',
        resolvedByName: 'Edda Editor',
        resolvedAt: expect.any(String),
      }),
    )
    // It belongs to who brought it in, and its trail says so.
    const events = await (await call(listEvents, '/', { projectId: copyId }, { cookie: importer.cookie })).json()
    expect(events.events[0]).toMatchObject({ action: 'project.import', actorName: 'Ida Importer' })
    expect((await call(getProject, '/', { projectId: copyId }, { cookie: owner.cookie })).status).toBe(404)
  }, 120_000)

  test('a note that was brought in bears the name of who changes it here', async () => {
    const copy = await bringIn(archive, importer.cookie)
    const { id } = await database.db
      .selectFrom('notes')
      .innerJoin('analyses', 'analyses.id', 'notes.analysisId')
      .select('notes.id')
      .where('analyses.projectId', '=', copy.id)
      .where('notes.resolvedAt', 'is not', null)
      .executeTakeFirstOrThrow()
    await database.db
      .updateTable('notes')
      .set({ updatedAt: new Date(), resolvedAt: new Date() })
      .where('id', '=', id)
      .execute()
    const row = await database.db.selectFrom('notes').selectAll().where('id', '=', id).executeTakeFirstOrThrow()
    expect(row).toMatchObject({ updatedByName: null, resolvedByName: null, authorName: 'Gone Gunnar' })
  }, 60_000)

  test('the download says how it is to be saved, and that nobody keeps a copy', async () => {
    const response = await call(downloadArchive, '/', { projectId }, { cookie: owner.cookie })
    expect(response.headers.get('content-type')).toBe('application/zip')
    expect(response.headers.get('cache-control')).toBe('private, no-store')
    expect(response.headers.get('content-disposition')).toMatch(
      /^attachment; filename="[\x20-\x7e]+\.zip"; filename\*=UTF-8''/,
    )
    await response.body?.cancel()
  })

  test('each JSON file names the schema that lies in the archive', async () => {
    const files = await unzip(archive)
    const schemas = new Map(
      [...files.keys()]
        .filter((path) => path.startsWith('schemas/'))
        .map((path) => [JSON.parse(textOf(files, path)).$id, JSON.parse(textOf(files, path))]),
    )
    const jsons = [...files.keys()].filter(
      (path) => /\.json$/.test(path) && !/^schemas|table\.json$|original/.test(path),
    )
    expect(jsons.length).toBeGreaterThan(8)
    for (const path of jsons) {
      const value = JSON.parse(textOf(files, path))
      const schema = schemas.get(value.$schema)
      expect(schema, path).toBeDefined()
      expect(Object.keys(value).sort()).toEqual(Object.keys(schema.properties).sort())
    }
  })

  test('a reader that goes away gives the connections back', async () => {
    for (let i = 0; i < 12; i++) {
      const response = await call(downloadArchive, '/', { projectId }, { cookie: owner.cookie })
      expect(response.status).toBe(200)
      const reader = response.body!.getReader()
      await reader.read()
      await expect.poll(openTransactions, { timeout: 10_000 }).toBe(1)
      await reader.cancel()
      // The transaction ends a moment after the reader has gone; until then its place is taken.
      await expect.poll(openTransactions, { timeout: 10_000 }).toBe(0)
    }
  }, 60_000)

  async function openTransactions() {
    const { rows } = await sql<{ count: number }>`select count(*)::int as count from pg_stat_activity
      where datname = current_database() and state like 'idle in transaction%'`.execute(database.db)
    return rows[0].count
  }

  type Tamper = (files: Files) => void | Promise<Uint8Array<ArrayBuffer>> | Uint8Array<ArrayBuffer>
  const text = (value: string) => new TextEncoder().encode(value)
  const first = (files: Files, pattern: RegExp) => [...files.keys()].find((path) => pattern.test(path))!
  const edit = (files: Files, pattern: RegExp, change: (value: string) => string) => {
    const path = first(files, pattern)
    replaceFile(files, path, text(change(textOf(files, path))))
  }

  const tampered: [string, Tamper, RegExp][] = [
    [
      'a byte of a JSON changed',
      (files) => void files.set('project.json', text(textOf(files, 'project.json').replace('180', '181'))),
      /project\.json.*SHA-256/,
    ],
    [
      'a byte of a recording changed',
      (files) => {
        const path = first(files, /original/)
        const bytes = files.get(path)!.slice()
        bytes[bytes.length - 2] ^= 1
        files.set(path, bytes)
      },
      /original\/.*SHA-256/,
    ],
    [
      'a recording exchanged with its hash in the manifest',
      (files) => replaceFile(files, first(files, /original/), text('a,b\n1,2\n')),
      /original\/.*SHA-256/,
    ],
    ['a file missing', (files) => void files.delete(first(files, /analysis\.json/)), /analysis\.json: it is missing/],
    [
      'a file too many',
      (files) => void files.set('extra.txt', text('Hello')),
      /extra\.txt: manifest\.json does not list it/,
    ],
    [
      'a file too many that is listed',
      (files) => replaceFile(files, 'run.exe', text('MZ')),
      /run\.exe: no archive holds such a file/,
    ],
    [
      'a path that leaves the archive',
      (files) => void files.set('../../etc/passwd', text('root')),
      /lies outside the archive/,
    ],
    ['a path with a drive', (files) => void files.set('C:/x.txt', text('x')), /lies outside the archive/],
    [
      'two names that differ in case only',
      (files) => void files.set('PROJECT.json', text('{}')),
      /PROJECT\.json is in it twice/,
    ],
    ['the second half cut off', async (files) => (await zipped(files)).slice(0, 5000), /no ZIP that can be read/],
    ['no ZIP at all', () => text('time,ra\n0,1\n'), /no ZIP that can be read/],
    ['nothing at all', () => new Uint8Array(), /no ZIP that can be read/],
    ['no manifest', (files) => void files.delete('manifest.json'), /no manifest\.json at the top/],
    ['a password', (files) => zipped(files, { password: 'secret' }), /is encrypted/],
    [
      'an entry that unpacks to more than it says',
      (files) => void files.set('project.json', new Uint8Array(30_000_000)),
      /project\.json is larger than it says/,
    ],
    [
      'a manifest that unpacks to more than is read',
      (files) => void files.set('manifest.json', new Uint8Array(40_000_000)),
      /manifest\.json is larger/,
    ],
    [
      'a newer version',
      (files) => {
        const manifest = JSON.parse(textOf(files, 'manifest.json'))
        files.set(
          'manifest.json',
          text(
            JSON.stringify({ ...manifest, version: 2, madeBy: { name: 'Turnwright', version: '9.1.0' }, new: true }),
          ),
        )
      },
      /has version 2 and was made by Turnwright 9\.1\.0; this server reads version 1/,
    ],
    [
      'a manifest of something else',
      (files) => void files.set('manifest.json', text('{"format":"other","version":1}')),
      /manifest\.json, at format/,
    ],
    [
      'broken JSON',
      (files) => edit(files, /run\.json/, (json) => json.slice(0, -10)),
      /run\.json: it is not readable JSON/,
    ],
    [
      'JSON that is no UTF-8',
      (files) => replaceFile(files, first(files, /run\.json/), new Uint8Array([0x22, 0xff, 0x22])),
      /run\.json: it is not readable JSON/,
    ],
    [
      'NaN in JSON',
      (files) => edit(files, /analysis\.json/, (json) => json.replace(/"rmsArcsec": [^,\n]+/, '"rmsArcsec": NaN')),
      /analysis\.json: it is not readable JSON/,
    ],
    [
      'a number past what can be kept',
      (files) => edit(files, /analysis\.json/, (json) => json.replace(/"rmsArcsec": [^,\n]+/, '"rmsArcsec": 1e999')),
      /analysis\.json: it holds a text or a number/,
    ],
    [
      'a text with NUL',
      (files) => edit(files, /project\.json/, (json) => json.replace(/"name": "/, '"name": "\\u0000')),
      /project\.json: it holds a text/,
    ],
    [
      'nesting without end',
      (files) =>
        edit(files, /trail\.json/, (json) =>
          json.replace('"events": [', `"deep": ${'['.repeat(50_000)}${']'.repeat(50_000)}, "events": [`),
        ),
      /trail\.json: it holds a text or a number/,
    ],
    [
      'a field that is not known',
      (files) => edit(files, /run\.json/, (json) => json.replace('{', '{"projectId": "x",')),
      /run\.json: at its top/,
    ],
    [
      'a result without a figure',
      (files) => edit(files, /analysis\.json/, (json) => json.replace(/"rmsArcsec": [^,\n]+/, '"rmsArcsec": null')),
      /analysis\.json: at result/,
    ],
    [
      'an analysis of a run that is not there',
      (files) => edit(files, /analysis\.json/, (json) => json.replace(/"run": "[^"]+"/, '"run": "runs/999-elsewhere"')),
      /it is of “runs\/999-elsewhere”/,
    ],
    [
      'a table made from nothing',
      (files) =>
        edit(files, /correction\.json/, (json) => json.replace(/"analysis": "[^"]+"/, '"analysis": "analyses/999"')),
      /was made from “analyses\/999”/,
    ],
    [
      'a run whose file lies elsewhere',
      (files) => edit(files, /run\.json/, (json) => json.replace(/"path": "[^"]+"/, '"path": "../../etc/passwd"')),
      /run\.json: it names the file/,
    ],
    [
      'a recording that no run names',
      (files) => {
        const folder = first(files, /run\.json/).replace('/run.json', '')
        replaceFile(files, `${folder}/original/second.csv`, text('1,2\n'))
      },
      /second\.csv: no run\.json names it/,
    ],
    [
      'samples that the file does not give',
      (files) =>
        edit(files, /run\.json/, (json) =>
          json.replace(/"samplesSha256": "[0-9a-f]/, (part) => `${part.slice(0, -1)}${part.endsWith('0') ? '1' : '0'}`),
        ),
      /gives other samples/,
    ],
    [
      'settings that do not fit the file',
      (files) => edit(files, /run\.json/, (json) => json.replace(/"displacement": 1,/, '"displacement": 77,')),
      /can’t be read as it was/,
    ],
  ]

  test.each(tampered)('%s: refused with the entry’s name, and nothing stays', async (_, tamper, message) => {
    const files = await unzip(archive)
    const before = await countRows()
    const body = (await tamper(files)) ?? (await zipped(files))
    const response = await upload(body, importer.cookie)
    const answer = await response.json()
    expect([response.status, answer.error?.code]).toEqual([422, 'bad-archive'])
    expect(answer.error.message).toMatch(message)
    expect(await countRows()).toEqual(before)
    expect(temporaryFolders()).toEqual([])
  })

  test('more entries than an archive can have', async () => {
    const { ARCHIVE_LIMITS } = await import('@/lib/server/archive-file')
    const limits = ARCHIVE_LIMITS as { mostEntries: number }
    const usual = limits.mostEntries
    limits.mostEntries = 5
    try {
      const response = await upload(archive, importer.cookie)
      expect([response.status, (await response.json()).error.message]).toEqual([
        422,
        'It holds more than 5 entries. No archive of ours does.',
      ])
    } finally {
      limits.mostEntries = usual
    }
  })

  test('what a server that was killed has left behind goes with the next archive, and nothing younger', async () => {
    const [old, young] = [1, 2].map(() => mkdtempSync(join(tmpdir(), 'turnwright-archive-')))
    try {
      writeFileSync(join(old, 'archive.zip'), 'half of one')
      const yesterday = new Date(Date.now() - 25 * 3_600_000)
      utimesSync(old, yesterday, yesterday)
      expect((await upload(text('no ZIP'), importer.cookie)).status).toBe(422)
      expect(temporaryFolders()).toEqual([young.split('/').at(-1)])
    } finally {
      for (const folder of [old, young]) rmSync(folder, { recursive: true, force: true })
    }
  })

  test('two entries that share their bytes, of which a small file could have thousands', async () => {
    const files = await unzip(archive)
    const twins = ['corrections/aaa/table.csv', 'corrections/bbb/table.csv']
    for (const path of twins) replaceFile(files, path, text('x'.repeat(5000)))
    const bytes = await zipped(files)
    const [first, second] = twins.map((path) => Buffer.from(bytes).lastIndexOf(path) - 46)
    const directory = new DataView(bytes.buffer, bytes.byteOffset)
    for (const at of [first, second]) expect(directory.getUint32(at, true)).toBe(0x02014b50)
    // The place of the second one's content is that of the first one's.
    directory.setUint32(second + 42, directory.getUint32(first + 42, true), true)
    const response = await upload(bytes, importer.cookie)
    const { error } = await response.json()
    expect([response.status, error.code]).toEqual([422, 'bad-archive'])
    expect(error.message).toMatch(/^corrections\/(aaa|bbb)\/table\.csv is damaged/)
    expect(temporaryFolders()).toEqual([])
  })

  test('an archive that unpacks to more than a fair multiple of its size', async () => {
    const { ARCHIVE_LIMITS } = await import('@/lib/server/archive-file')
    const limits = ARCHIVE_LIMITS as { ratioFreeBytes: number }
    const usual = limits.ratioFreeBytes
    limits.ratioFreeBytes = 40_000_000
    try {
      const files: Files = new Map([['manifest.json', (await unzip(archive)).get('manifest.json')!]])
      files.set('manifest.json', text(textOf(files, 'manifest.json').replace(/"files": \[[^]*\]/, '"files": []')))
      for (let i = 0; i < 3; i++) replaceFile(files, `corrections/${i}/table.csv`, new Uint8Array(30_000_000))
      for (const path of ['project.json', 'trail.json']) replaceFile(files, path, text('{}'))
      const bomb = await zipped(files)
      expect(bomb.length).toBeLessThan(200_000)
      const response = await upload(bomb, importer.cookie)
      const { error } = await response.json()
      expect([response.status, error.code]).toEqual([422, 'bad-archive'])
      expect(error.message).toMatch(/unpacks the archive to more than 200 times its size/)
    } finally {
      limits.ratioFreeBytes = usual
    }
  })

  test('several faults are named at once', async () => {
    const files = await unzip(archive)
    files.delete(first(files, /analysis\.json/))
    files.set('extra.txt', text('Hello'))
    const { error } = await (await upload(await zipped(files), importer.cookie)).json()
    expect(Object.keys(error.fields)).toHaveLength(2)
    expect(error.message).toMatch(/One more entry is at fault/)
  })

  test('an upload that breaks off leaves neither a file nor a row', async () => {
    const before = await countRows()
    let sent = 0
    const stream = new ReadableStream<Uint8Array>({
      pull(controller) {
        if (sent > 3) return controller.error(new Error('gone'))
        controller.enqueue(archive.slice(sent * 1000, (sent += 1) * 1000))
      },
    })
    const response = await upload(stream, importer.cookie)
    expect([response.status, (await response.json()).error.code]).toEqual([400, 'upload-incomplete'])
    expect(await countRows()).toEqual(before)
    expect(temporaryFolders()).toEqual([])
  })

  test('who is not signed in brings nothing in, and neither does another site’s page', async () => {
    expect((await upload(archive, '')).status).toBe(401)
    const { POST } = await import('@/app/api/projects/import/route')
    const options = { method: 'POST', body: archive, cookie: importer.cookie, origin: 'https://elsewhere.example' }
    expect((await call(POST, '/', {}, options)).status).toBe(403)
  })
})
