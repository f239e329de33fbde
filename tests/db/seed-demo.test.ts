import { createHash } from 'node:crypto'
import { gunzipSync } from 'node:zlib'
import { sql } from 'kysely'
import { beforeAll, describe, expect, test } from 'vitest'
import { accessProject, type ProjectAccess } from '@/db/queries/access'
import { findAnalysis } from '@/db/queries/analyses'
import { findCorrection } from '@/db/queries/corrections'
import { listAuditEvents } from '@/db/queries/list-audit-events'
import { listAnalyses } from '@/db/queries/list-analyses'
import { listCorrections } from '@/db/queries/list-corrections'
import { listProjects } from '@/db/queries/list-projects'
import { listRuns } from '@/db/queries/list-runs'
import { listNotes } from '@/db/queries/notes'
import { listMembers } from '@/db/queries/projects'
import { findRunColumns, readRunFile } from '@/db/queries/run-files'
import { findRun } from '@/db/queries/runs'
import { insertUser } from '@/db/queries/users'
import { seedDemo, type DemoUserIds } from '@/db/seed-demo'
import { analyseAtOnce } from '@/lib/analysis/analyse'
import { unpackColumns } from '@/lib/formats/packed-columns'
import { correctionSchema, noteListSchema } from '@/lib/schemas/api'
import {
  analysisListSchema,
  analysisQuerySchema,
  auditQuerySchema,
  correctionQuerySchema,
  projectQuerySchema,
  runListSchema,
  runQuerySchema,
} from '@/lib/schemas/lists'
import { DEMO_PEOPLE, DEMO_PROJECT_NAME, demoRuns } from '@/lib/simulate/demo'
import { openTestDatabase } from '../support/test-database'

const database = openTestDatabase()
const demo = demoRuns()
const wholePage = { limit: 50 }
const allRuns = () => listRuns(database.db, access, runQuerySchema.parse({ ...wholePage, sort: 'created' }))
const allAnalyses = () => listAnalyses(database.db, access, analysisQuerySchema.parse(wholePage))
const projectsOf = async (userId: string) =>
  (await listProjects(database.db, userId, projectQuerySchema.parse({}))).projects
let users: DemoUserIds
let access: ProjectAccess<'read'>

/** As a handler would answer: dates as text. */
const answered = (value: unknown): unknown => JSON.parse(JSON.stringify(value))

beforeAll(async () => {
  const entries: [string, string][] = []
  for (const { key, displayName, email } of DEMO_PEOPLE) {
    const user = await insertUser(database.db, {
      displayName,
      email,
      passwordHash: '$argon2id$nobody-signs-in-with-this',
    })
    entries.push([key, user!.id])
  }
  users = Object.fromEntries(entries) as DemoUserIds
  expect(await seedDemo(database.db, users)).toBe(true)
  const [project] = await projectsOf(users.ines)
  access = await accessProject(database.db, { userId: users.ines, projectId: project.id, right: 'read' })
}, 120_000)

test('a second start stores nothing again', async () => {
  expect(await seedDemo(database.db, users)).toBe(false)
  const projects = await projectsOf(users.mira)
  expect(projects.map(({ name }) => name)).toEqual([DEMO_PROJECT_NAME])
  expect(projects[0]).toMatchObject({ runCount: 8, analysisCount: 8, memberCount: 3, role: 'owner' })
})

test('everyone has the role of the story', async () => {
  const members = await listMembers(database.db, access)
  expect(members.map(({ displayName, role }) => [displayName, role])).toEqual(
    DEMO_PEOPLE.map(({ displayName, role }) => [displayName, role]),
  )
})

describe('runs', () => {
  test('are there, newest first, as the API answers them', async () => {
    const list = await allRuns()
    const { runs } = runListSchema.parse(answered(list))
    expect(runs.map(({ name }) => name)).toEqual(demo.map(({ name }) => name).reverse())
    for (const run of runs) expect(run.status).toBe('ready')
  })

  test('keep their files byte for byte', async () => {
    const { runs } = await allRuns()
    for (const { fileName, text } of demo) {
      const run = runs.find((stored) => stored.fileName === fileName)!
      const parts: Buffer[] = []
      for await (const part of readRunFile(database.db, access, run.id)) parts.push(part)
      const bytes = Buffer.concat(parts)
      expect(bytes.toString('utf8') === text).toBe(true)
      expect(createHash('sha256').update(bytes).digest('hex')).toBe(
        (await findRun(database.db, access, run.id)).fileSha256,
      )
    }
  })
})

describe('analyses', () => {
  test('one of each run, of the samples that are stored', async () => {
    const { analyses } = analysisListSchema.parse(answered(await allAnalyses()))
    const { runs } = await allRuns()
    expect(analyses.map(({ runId }) => runId)).toEqual(runs.map(({ id }) => id))
    for (const analysis of analyses) {
      const run = await findRun(database.db, access, analysis.runId)
      const { samplesSha256 } = await findAnalysis(database.db, access, analysis.id)
      expect(samplesSha256).toBe(run.samplesSha256)
      const { bytes } = await findRunColumns(database.db, access, run.id)
      expect(createHash('sha256').update(gunzipSync(bytes)).digest('hex')).toBe(samplesSha256)
    }
  })

  test(
    'a saved one comes out the same when it is computed again from what is stored',
    { timeout: 60_000 },
    async () => {
      const { analyses } = await allAnalyses()
      const { recipe, result, runId } = await findAnalysis(database.db, access, analyses[0].id)
      const { bytes } = await findRunColumns(database.db, access, runId)
      const again = analyseAtOnce(unpackColumns(gunzipSync(bytes)).columns, recipe)
      expect(again.ok && answered(again.result)).toEqual(result)
    },
  )

  test('find the truth that the simulator put in, within four standard errors', async () => {
    const { analyses } = await allAnalyses()
    const { runs } = await allRuns()
    for (const { fileName, truth } of demo) {
      const run = runs.find((stored) => stored.fileName === fileName)!
      const { id } = analyses.find(({ runId }) => runId === run.id)!
      const { worm } = (await findAnalysis(database.db, access, id)).result as unknown as { worm: WormFigures }
      if (worm.periodSeconds.stderr !== null) {
        // 86164.0905 s / 152 (mean sidereal day of Aoki et al. 1982, A&A 105, 359).
        expect(Math.abs(worm.periodSeconds.value - 566.86901645)).toBeLessThan(4 * worm.periodSeconds.stderr)
      }
      for (const { order, amplitudeArcsec } of worm.harmonics) {
        const real = truth.harmonics.find((harmonic) => harmonic.order === order)
        expect(real).toBeDefined()
        const amplitude = Math.hypot(real!.cosArcsec, real!.sinArcsec)
        expect(Math.abs(amplitudeArcsec.value - amplitude)).toBeLessThan(4 * amplitudeArcsec.stderr)
      }
    }
  })

  test('carry notes of every kind', async () => {
    const { analyses } = await allAnalyses()
    const kinds = new Set<string>()
    const settled: (string | null)[] = []
    const named: string[] = []
    for (const { id } of analyses) {
      const { notes } = noteListSchema.parse(answered({ notes: await listNotes(database.db, access, id) }))
      for (const { anchor, resolvedAt, resolvedByName, mentions } of notes) {
        kinds.add(anchor.kind)
        if (resolvedAt) settled.push(resolvedByName)
        named.push(...mentions.map(({ displayName }) => displayName))
      }
    }
    expect([...kinds].sort()).toEqual(['period', 'time', 'whole', 'worm-angle'])
    expect(settled).toEqual(['Tomas Lindqvist'])
    expect(named).toEqual(['Tomas Lindqvist'])
    // Nobody at hillside.example reads mail.
    const { rows } = await sql`select from graphile_worker._private_jobs`.execute(database.db)
    expect(rows).toHaveLength(0)
  })
})

test('the log tells the story in its order', async () => {
  const { events } = await listAuditEvents(database.db, access, auditQuerySchema.parse(wholePage))
  const actions = events.map(({ action }) => action).reverse()
  const perRun = demo.flatMap(() => ['run.upload', 'analysis.save'])
  expect(actions).toEqual(['project.create', ...perRun, 'correction.create'])
})

test('there is one correction table, made after the mesh was eased; it closes over a turn', async () => {
  const { corrections } = await listCorrections(database.db, access, correctionQuerySchema.parse(wholePage))
  expect(corrections).toHaveLength(1)
  const correction = correctionSchema.parse(answered(await findCorrection(database.db, access, corrections[0].id)))
  expect(correction.table.bins).toHaveLength(240)
  expect(Math.abs(correction.table.closureError)).toBeLessThan(1e-9)
  expect(correction.analysisName).toContain('21 November')
})

interface WormFigures {
  periodSeconds: { value: number; stderr: number | null }
  harmonics: { order: number; amplitudeArcsec: { value: number; stderr: number } }[]
}
