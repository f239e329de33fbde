import { createHash, randomBytes } from 'node:crypto'
import { gunzipSync } from 'node:zlib'
import { beforeAll, expect, test } from 'vitest'
import * as project from '@/app/api/projects/[projectId]/route'
import * as runs from '@/app/api/projects/[projectId]/runs/route'
import * as run from '@/app/api/projects/[projectId]/runs/[runId]/route'
import * as runColumns from '@/app/api/projects/[projectId]/runs/[runId]/columns/route'
import * as runFile from '@/app/api/projects/[projectId]/runs/[runId]/file/route'
import * as runImport from '@/app/api/projects/[projectId]/runs/[runId]/import/route'
import { unpackColumns } from '@/lib/formats/packed-columns'
import { runSchema } from '@/lib/schemas/api'
import { unknownRunFacts } from '@/lib/schemas/run-facts'
import { openTestDatabase } from '../support/test-database'
import {
  CONVERSION,
  makeAnalysis,
  makeProject,
  makeRun,
  recordingText,
  SETTINGS,
  upload,
} from '../support/test-project'
import { call, type Call } from '../support/test-server'

const database = openTestDatabase()
const MEGABYTE = 1024 * 1024
const LIMIT = 64 * MEGABYTE

let projectId: string
let owner: { projectId: string; cookie: string }
let editor: { projectId: string; cookie: string }

beforeAll(async () => {
  const { id, people } = await makeProject(database.db)
  projectId = id
  owner = { projectId, cookie: people.owner.cookie }
  editor = { projectId, cookie: people.editor.cookie }
})

function post(body: unknown, options: Call = {}) {
  const query = '?name=Night&fileName=night.bin'
  return call(runs.POST, `/${query}`, { projectId }, { method: 'POST', body, cookie: owner.cookie, ...options })
}

async function counts() {
  const [{ runCount }] = await database.db
    .selectFrom('runs')
    .select((eb) => eb.fn.countAll<string>().as('runCount'))
    .execute()
  const [{ chunkCount }] = await database.db
    .selectFrom('runFileChunks')
    .select((eb) => eb.fn.countAll<string>().as('chunkCount'))
    .execute()
  return { runCount, chunkCount }
}

/** A body of so many bytes in pieces of an odd size, so that no piece ends where a stored row does. */
function streamOf(byteLength: number, failAt = Infinity): ReadableStream<Uint8Array> {
  const piece = randomBytes(100_003)
  let sent = 0
  return new ReadableStream({
    pull(controller) {
      if (sent >= failAt) return controller.error(new Error('The connection was lost'))
      const size = Math.min(piece.length, byteLength - sent)
      if (size > 0) controller.enqueue(piece.subarray(0, size))
      sent += size
      if (sent >= byteLength) controller.close()
    },
  })
}

test.each([1, MEGABYTE - 1, MEGABYTE, MEGABYTE + 1, 3 * MEGABYTE + 17])(
  'a file of %i bytes comes back byte for byte, with its hash',
  async (byteLength) => {
    const bytes = randomBytes(byteLength)
    const response = await post(bytes, { headers: { 'content-length': String(byteLength) } })
    expect(response.status).toBe(201)
    const made = runSchema.parse(await response.json())
    const fileSha256 = createHash('sha256').update(bytes).digest('hex')
    expect(made).toMatchObject({ status: 'uploaded', name: 'Night', fileName: 'night.bin', byteLength, fileSha256 })
    const file = await call(runFile.GET, '/', { projectId, runId: made.id }, { cookie: editor.cookie })
    expect(file.headers.get('content-disposition')).toContain('attachment; filename="night.bin"')
    expect(Buffer.from(await file.arrayBuffer()).equals(bytes)).toBe(true)
    const rows = await database.db.selectFrom('runFileChunks').select('bytes').where('runId', '=', made.id).execute()
    expect(rows.every(({ bytes: { length } }) => length <= MEGABYTE)).toBe(true)
    expect(rows).toHaveLength(Math.ceil(byteLength / MEGABYTE))
  },
)

test('64 MB are kept', async () => {
  const response = await post(streamOf(LIMIT))
  expect(response.status).toBe(201)
  const { id, byteLength } = await response.json()
  expect(byteLength).toBe(LIMIT)
  const removed = await call(run.DELETE, '/', { projectId, runId: id }, { method: 'DELETE', cookie: owner.cookie })
  expect(removed.status).toBe(204)
}, 30_000)

test.each([
  ['announced', { 'content-length': String(LIMIT + 1) }],
  ['not announced', {}],
])(
  'one byte over 64 MB, %s, is refused and leaves nothing',
  async (_, headers) => {
    const before = await counts()
    const response = await post(streamOf(LIMIT + 1), { headers: headers as Record<string, string> })
    expect(response.status).toBe(413)
    expect((await response.json()).error).toMatchObject({
      code: 'too-large',
      message: expect.stringContaining('64 MB'),
    })
    expect(await counts()).toEqual(before)
  },
  30_000,
)

test('an upload that breaks off leaves nothing', async () => {
  const before = await counts()
  const response = await post(streamOf(5 * MEGABYTE, 3 * MEGABYTE))
  expect(response.status).toBe(400)
  expect((await response.json()).error.code).toBe('upload-incomplete')
  expect(await counts()).toEqual(before)
})

test.each([
  ['fewer', 2 * MEGABYTE + 5],
  ['more', 2 * MEGABYTE - 5],
])('%s bytes than announced are refused and leave nothing', async (_, announced) => {
  const before = await counts()
  const headers = { 'content-length': String(announced) }
  const response = await post(streamOf(2 * MEGABYTE), { headers })
  expect(response.status).toBe(400)
  expect((await response.json()).error.code).toBe('upload-incomplete')
  expect(await counts()).toEqual(before)
})

test('an empty file is refused and leaves nothing', async () => {
  const before = await counts()
  const response = await post(new Uint8Array(0))
  expect(response.status).toBe(422)
  expect((await response.json()).error.code).toBe('empty')
  expect(await counts()).toEqual(before)
})

test('a file name is cut to its last part, and nothing in it reaches a header', async () => {
  const fileName = encodeURIComponent('C:\\nights\\../"a"\r\nset-cookie: x=1;ä.csv')
  const response = await call(
    runs.POST,
    `/?fileName=${fileName}`,
    { projectId },
    {
      method: 'POST',
      body: new TextEncoder().encode('x'),
      cookie: owner.cookie,
    },
  )
  const made = await response.json()
  expect(made).toMatchObject({ fileName: '"a"set-cookie: x=1;ä.csv', name: '"a"set-cookie: x=1;ä.csv' })
  const file = await call(runFile.GET, '/', { projectId, runId: made.id }, { cookie: owner.cookie })
  expect(file.headers.get('set-cookie')).toBeNull()
  expect(file.headers.get('content-disposition')).toBe(
    `attachment; filename="_a_set-cookie: x=1;_.csv"; filename*=UTF-8''%22a%22set-cookie%3A%20x%3D1%3B%C3%A4.csv`,
  )
})

test('a file sent again after a lost answer is stored once; once read, or under another name, it is another run', async () => {
  const first = await upload(owner, recordingText(61))
  const before = await counts()
  expect(await upload(owner, recordingText(61))).toEqual(first)
  expect(await counts()).toEqual(before)
  expect((await upload(editor, recordingText(61))).id).not.toBe(first.id)
  const bytes = new TextEncoder().encode(recordingText(61))
  const other = await (await post(bytes)).json()
  expect(other.id).not.toBe(first.id)
  expect((await put(first.id)).status).toBe(200)
  expect((await upload(owner, recordingText(61))).id).not.toBe(first.id)
})

test('more readings at once than the server has room for are put off, and nothing is lost', async () => {
  const stored = []
  for (let index = 0; index < 8; index += 1) stored.push(await upload(owner, recordingText(70 + index)))
  const statuses = (await Promise.all(stored.map(({ id }) => put(id)))).map(({ status }) => status)
  expect(new Set(statuses)).toEqual(new Set([200, 503]))
  const later = await put(stored[statuses.indexOf(503)].id)
  expect(later.status).toBe(200)
})

test('characters that the database can’t hold are left out of names', async () => {
  const bytes = new TextEncoder().encode(recordingText(62))
  const query = '?name=Ni%00ght%07&fileName=night.csv'
  const init = { method: 'POST', body: bytes, cookie: owner.cookie }
  const response = await call(runs.POST, `/${query}`, { projectId }, init)
  expect(await response.json()).toMatchObject({ name: 'Night' })
})

test('a place in the list that is none of ours is refused', async () => {
  for (const cursor of ['x', Buffer.from('+275000-01-01T00:00:00Z x').toString('base64url')]) {
    const response = await call(runs.GET, `/?cursor=${cursor}`, { projectId }, { cookie: owner.cookie })
    expect(response.status).toBe(422)
  }
})

function put(runId: string, given: Record<string, unknown> = {}) {
  const body = { version: 1, settings: SETTINGS, conversion: CONVERSION, facts: unknownRunFacts(), ...given }
  return call(runImport.PUT, '/', { projectId, runId }, { method: 'PUT', body, cookie: editor.cookie })
}

test('reading a file keeps its columns to the bit, the choices, and remembers them for the project', async () => {
  const { id } = await upload(owner)
  const response = await put(id)
  const read = runSchema.parse(await response.json())
  expect(read).toMatchObject({
    status: 'ready',
    rowCount: 60,
    version: 2,
    importSettings: SETTINGS,
    conversion: CONVERSION,
  })
  const stored = await call(runColumns.GET, '/', { projectId, runId: id }, { cookie: owner.cookie })
  expect(stored.headers.get('content-type')).toBe('application/gzip')
  const packed = new Uint8Array(gunzipSync(await stored.arrayBuffer()))
  expect(createHash('sha256').update(packed).digest('hex')).toBe(read.samplesSha256)
  const { columns } = unpackColumns(packed)
  const expected = recordingText()
    .trim()
    .split('\n')
    .slice(1)
    .map((row) => row.split(',').map(Number))
  expect([...columns.timeSeconds]).toEqual(expected.map(([time]) => time))
  expect([...columns.displacement]).toEqual(expected.map(([, displacement]) => displacement))
  const etag = stored.headers.get('etag') ?? ''
  const again = await call(
    runColumns.GET,
    '/',
    { projectId, runId: id },
    {
      cookie: owner.cookie,
      headers: { 'if-none-match': etag },
    },
  )
  expect(again.status).toBe(304)
  const { lastImport } = await (await call(project.GET, '/', { projectId }, { cookie: owner.cookie })).json()
  expect(lastImport).toEqual({ settings: SETTINGS, conversion: CONVERSION })
})

test.each([
  ['binary', '\u0000\u0001\u0002PNG', { code: 'binary', row: null }],
  ['of five rows', recordingText(5), { code: 'few-rows' }],
  ['whose time goes back', recordingText().replace('\n100,', '\n5,'), { code: 'time-goes-back', row: 12 }],
])('a file %s is refused with its fault, and stays as it was', async (_, text, fault) => {
  const { id } = await upload(owner, text)
  const response = await put(id)
  expect(response.status).toBe(422)
  expect((await response.json()).error).toMatchObject({ message: expect.stringMatching(/\.$/), ...fault })
  const kept = await call(run.GET, '/', { projectId, runId: id }, { cookie: owner.cookie })
  expect(await kept.json()).toMatchObject({ status: 'uploaded', version: 1, rowCount: null })
  const file = await call(runFile.GET, '/', { projectId, runId: id }, { cookie: owner.cookie })
  expect(await file.text()).toBe(text)
  const columns = await call(runColumns.GET, '/', { projectId, runId: id }, { cookie: owner.cookie })
  expect(columns.status).toBe(404)
})

test('a fault in a second reading leaves the first one in place', async () => {
  const { id, samplesSha256 } = await makeRun(owner)
  const columns = { ...SETTINGS.columns, displacement: 7 }
  const response = await put(id, { version: 2, settings: { ...SETTINGS, columns } })
  expect(response.status).toBe(422)
  const kept = await call(run.GET, '/', { projectId, runId: id }, { cookie: owner.cookie })
  expect(await kept.json()).toMatchObject({ status: 'ready', version: 2, samplesSha256, importSettings: SETTINGS })
})

test('settings that are no settings are refused field by field', async () => {
  const { id } = await upload(owner)
  const response = await put(id, { settings: { ...SETTINGS, columns: { ...SETTINGS.columns, time: -1 } } })
  expect(response.status).toBe(422)
  expect(Object.keys((await response.json()).error.fields)).toEqual(['settings.columns.time'])
})

test('an edit made from an older version loses nothing: who, when, and how it stands now', async () => {
  const made = await makeRun(owner)
  const patch = (name: string, version: number, cookie: string) =>
    call(
      run.PATCH,
      '/',
      { projectId, runId: made.id },
      {
        method: 'PATCH',
        cookie,
        body: { version, name, conversion: CONVERSION, facts: made.facts },
      },
    )
  const first = await patch('By the editor', made.version, editor.cookie)
  const changed = await first.json()
  expect(changed).toMatchObject({ name: 'By the editor', version: made.version + 1 })
  const second = await patch('By the owner', made.version, owner.cookie)
  expect(second.status).toBe(409)
  const { error } = await second.json()
  expect(error).toMatchObject({
    code: 'changed-meanwhile',
    changedBy: 'Edda Editor',
    changedAt: changed.updatedAt,
    message: expect.stringContaining('Edda Editor'),
  })
  expect(runSchema.parse(error.current)).toEqual(changed)
  expect((await patch('By the owner', changed.version, owner.cookie)).status).toBe(200)
})

test('of two edits at the same moment exactly one is taken', async () => {
  const made = await makeRun(owner)
  const patch = (name: string) =>
    call(
      run.PATCH,
      '/',
      { projectId, runId: made.id },
      {
        method: 'PATCH',
        cookie: owner.cookie,
        body: { version: made.version, name, conversion: CONVERSION, facts: made.facts },
      },
    )
  const responses = await Promise.all(['a', 'b', 'c', 'd'].map(patch))
  expect(responses.map(({ status }) => status).sort()).toEqual([200, 409, 409, 409])
})

test('a run with a saved analysis is not deleted', async () => {
  const made = await makeRun(owner)
  await makeAnalysis(owner, made.id)
  const response = await call(
    run.DELETE,
    '/',
    { projectId, runId: made.id },
    { method: 'DELETE', cookie: owner.cookie },
  )
  expect(response.status).toBe(409)
  expect((await response.json()).error).toMatchObject({
    code: 'in-use',
    message: expect.stringContaining('First light'),
  })
})

test('the list is paged newest first, without a gap or a repetition', async () => {
  const { id: listed, people } = await makeProject(database.db)
  const where = { projectId: listed, cookie: people.owner.cookie }
  const made: string[] = []
  for (let index = 0; index < 5; index += 1) made.push((await upload(where, recordingText(60 + index))).id)
  const at = new Date('2026-11-01T00:00:00Z')
  await database.db.updateTable('runs').set({ createdAt: at }).where('id', 'in', made.slice(0, 3)).execute()
  const seen: string[] = []
  let cursor: string | null = ''
  while (cursor !== null) {
    const query: string = `/?sort=created&limit=2${cursor && `&cursor=${cursor}`}`
    const page = await (await call(runs.GET, query, { projectId: listed }, where)).json()
    seen.push(...page.runs.map(({ id }: { id: string }) => id))
    cursor = page.nextCursor
  }
  const sameMoment = made.slice(0, 3).sort().reverse()
  expect(seen).toEqual([made[4], made[3], ...sameMoment])
})
