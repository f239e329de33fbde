import { sql } from 'kysely'
import { expect } from 'vitest'
import { POST as saveAnalysis } from '@/app/api/projects/[projectId]/analyses/route'
import { POST as writeNote } from '@/app/api/projects/[projectId]/analyses/[analysisId]/notes/route'
import { POST as makeCorrection } from '@/app/api/projects/[projectId]/corrections/route'
import { PUT as changeDriveTrain } from '@/app/api/projects/[projectId]/drive-train/route'
import { PATCH as rename } from '@/app/api/projects/[projectId]/route'
import { POST as uploadRun } from '@/app/api/projects/[projectId]/runs/route'
import { PUT as importRun } from '@/app/api/projects/[projectId]/runs/[runId]/import/route'
import type { createDatabase } from '@/db/create-db'
import type { Run } from '@/lib/schemas/api'
import { defaultRecipe } from '@/lib/schemas/recipe'
import { unknownRunFacts } from '@/lib/schemas/run-facts'
import { CONVERSION, DRIVE_TRAIN, makePreset, makeProject, SETTINGS, recordingText, someResult } from './test-project'
import { call, signUpPerson, type Person } from './test-server'

type Db = ReturnType<typeof createDatabase>['db']

/** What file systems, spreadsheets and readers of text stumble over; 120 characters at most. */
const NAMES = {
  project: 'Grüße / “Alt-Azimut” \\ C:\\CON <b>*?|\u202e 🔭👨‍👩‍👧 =1+1',
  long: `${'Überlänge '.repeat(12)}`.slice(0, 119).padEnd(120, 'ß'),
  formula: '=HYPERLINK("x")',
}

async function made(pending: Promise<Response>, status = 201) {
  const response = await pending
  const body = await response.json()
  expect([response.status, body.error]).toEqual([status, undefined])
  return body
}

/** Some 5 MB that can be read: 300 000 rows of a slow swing. */
function longRecording(): string {
  const rows = Array.from({ length: 300_000 }, (_, i) => `${i},${(4 * Math.sin(i / 90.2) + (i % 7) / 10).toFixed(6)}`)
  return ['time (s),ra (arcsec)', ...rows, ''].join('\n')
}

/** A project through the API's own handlers, made of what is awkward to keep in files. */
export async function makeNastyProject(db: Db): Promise<{ projectId: string; owner: Person }> {
  const { id: projectId, people } = await makeProject(db)
  const { owner, editor } = people
  const gone = await signUpPerson('Gone Gunnar')
  await db.insertInto('memberships').values({ projectId, userId: gone.id, role: 'editor' }).execute()
  const send = (
    handler: unknown,
    params: Record<string, string>,
    body: unknown,
    { method = 'POST', by = owner } = {},
  ) => call(handler, '/', { projectId, ...params }, { method, body, cookie: by.cookie })
  const run = async (name: string, fileName: string, text: string): Promise<Run> => {
    const path = `/?${new URLSearchParams({ name, fileName })}`
    const body = new TextEncoder().encode(text)
    return made(call(uploadRun, path, { projectId }, { method: 'POST', body, cookie: editor.cookie }))
  }
  const read = (unread: Run, mountCorrection: 'on' | 'off') => {
    const facts = {
      ...unknownRunFacts(),
      mountCorrection,
      loadAndBalance: 'schwer, “kopflastig”\n2 kg',
      senseProof: '🌟',
    }
    const body = { version: unread.version, settings: SETTINGS, conversion: CONVERSION, facts }
    return made(send(importRun, { runId: unread.id }, body, { method: 'PUT' }), 200)
  }

  await made(send(rename, {}, { version: 1, name: NAMES.project }, { method: 'PATCH' }), 200)
  await made(
    send(changeDriveTrain, {}, { version: 2, driveTrain: { ...DRIVE_TRAIN, wheelTeeth: 180 } }, { method: 'PUT' }),
    200,
  )
  await makePreset({ projectId, cookie: owner.cookie })
  const plain = await read(await run('Zwei gleiche', 'CON.csv', recordingText()), 'off')
  const same = await read(await run('Zwei gleiche', 'CON.csv', recordingText(80)), 'on')
  await read(await run(NAMES.long, `${'ä'.repeat(250)}.csv`, longRecording()), 'off')
  await run('🔭', 'nicht gelesen?.txt', 'kein Datum, keine Zahlen')
  await run(NAMES.formula, 'two  spaces .csv. ', '\u0001\u0002 no text')

  const odd = someResult({ table: someResult().table })
  const oddRate = { ...odd.rate, percentOfSidereal: 5e-324, steepestArcsecPerSecond: 0.1 + 0.2 }
  const oddSpans = { ...odd.spans, rawArcsec: Number.MAX_VALUE, driftArcsec: 123456789 }
  const save = (runId: string, name: string) => {
    const body = {
      runId,
      name,
      recipe: defaultRecipe(),
      result: { ...odd, rate: oddRate, spans: oddSpans, later: { x: 1 / 3 } },
    }
    // JSON.stringify writes 0 for −0; the sender of this one does not.
    const text = JSON.stringify(body).replace('"driftArcsec":123456789', '"driftArcsec":-0')
    return made(send(saveAnalysis, {}, new TextEncoder().encode(text), { by: editor }))
  }
  const first = await save(plain.id, 'Erster Blick: a/b')
  const second = await save(same.id, NAMES.formula)
  await save(plain.id, 'Erster Blick: a/b ')

  const table = { name: 'Tafel "A"', isAssumedSenseConfirmed: true }
  await made(send(makeCorrection, {}, { ...table, analysisId: first.id, kind: 'stand-alone' }))
  await made(send(makeCorrection, {}, { ...table, analysisId: second.id, kind: 'addition' }, { by: editor }))

  const anchors = [
    { kind: 'whole' },
    { kind: 'time', timeSeconds: -0.1 },
    { kind: 'period', periodSeconds: 1 / 3 },
    { kind: 'worm-angle', angleDegrees: 359.99999999999994 },
  ]
  for (const [index, anchor] of anchors.entries()) {
    const note = { anchor, text: `Zeile ${index}\r\n\t“${NAMES.formula}” 👩‍🚀` }
    const { id } = await made(send(writeNote, { analysisId: first.id }, note, { by: gone }))
    if (index > 1) continue
    const settled = { resolvedAt: sql<Date>`now() + interval '1 hour'`, resolvedBy: editor.id }
    await db
      .updateTable('notes')
      .set({ ...settled, updatedAt: sql<Date>`now() + interval '2 hours'`, updatedBy: owner.id, version: 3 })
      .where('id', '=', id)
      .execute()
  }
  // The account goes, its name stays with what its person wrote.
  await db
    .updateTable('users')
    .set({ deletedAt: new Date(), email: null, passwordHash: null })
    .where('id', '=', gone.id)
    .execute()
  await db.deleteFrom('memberships').where('userId', '=', gone.id).execute()
  return { projectId, owner }
}
