import { sql, type Kysely, type Transaction } from 'kysely'
import type { z } from 'zod'
import type { AnalysisResult, Recipe } from '@/lib/analysis/types'
import type { analysisResultSchema } from '@/lib/schemas/api'
import type { Database } from '../schema'
import type { ProjectAccess } from './access'
import { changedMeanwhile } from './changed-meanwhile'
import { Refusal, unknownThing } from './refusal'

function summariesOf(db: Kysely<Database>, access: ProjectAccess) {
  return db
    .selectFrom('analyses')
    .innerJoin('runs', 'runs.id', 'analyses.runId')
    .innerJoin('users', 'users.id', 'analyses.createdBy')
    .where('analyses.projectId', '=', access.projectId)
    .select([
      'analyses.id',
      'analyses.version',
      'analyses.projectId',
      'analyses.runId',
      'runs.name as runName',
      'analyses.name',
      'analyses.engineVersion',
      'analyses.samplesSha256',
      'analyses.wormPeriodSeconds',
      'analyses.wormPeriodStderrSeconds',
      'analyses.wormAmplitudeArcsec',
      'analyses.wormAmplitudeStderrArcsec',
      'analyses.peakToPeakArcsec',
      'analyses.peakToPeakStderrArcsec',
      'analyses.createdAt',
      'analyses.updatedAt',
      sql<string>`coalesce(analyses.author_name, users.display_name)`.as('createdBy'),
    ])
}

export async function findAnalysis(db: Kysely<Database>, access: ProjectAccess, analysisId: string) {
  const analysis = await summariesOf(db, access)
    .select(['analyses.recipe', 'analyses.result'])
    .where('analyses.id', '=', analysisId)
    .executeTakeFirst()
  if (!analysis) throw unknownThing('analysis')
  return analysis
}

export interface NewAnalysis {
  runId: string
  name: string
  recipe: Recipe
  /** As it was shown; kept whole. */
  result: z.infer<typeof analysisResultSchema>
  samplesSha256: string
  /** The result's worm figures, for lists. */
  worm: AnalysisResult['worm']
}

/** The figures of the worm that lists show, taken out of a result. */
export function wormColumns(worm: AnalysisResult['worm']) {
  const fundamental = worm?.harmonics.find(({ order }) => order === 1)?.amplitudeArcsec
  return {
    wormPeriodSeconds: worm?.periodSeconds.value ?? null,
    wormPeriodStderrSeconds: worm?.periodSeconds.stderr ?? null,
    wormAmplitudeArcsec: fundamental?.value ?? null,
    wormAmplitudeStderrArcsec: fundamental?.stderr ?? null,
    peakToPeakArcsec: worm?.peakToPeakArcsec.value ?? null,
    peakToPeakStderrArcsec: worm?.peakToPeakArcsec.stderr ?? null,
  }
}

/** Keeps the analysis; the very same one, saved again by the same person, is kept once (an answer may have been lost). */
export async function insertAnalysis(trx: Transaction<Database>, access: ProjectAccess<'edit'>, fields: NewAnalysis) {
  const { runId, name, recipe, result, samplesSha256, worm } = fields
  const recipeText = JSON.stringify(recipe)
  const resultText = JSON.stringify(result)
  const twin = await trx
    .selectFrom('analyses')
    .select('id')
    .where('runId', '=', runId)
    .where('projectId', '=', access.projectId)
    .where('createdBy', '=', access.userId)
    .where('name', '=', name)
    .where('samplesSha256', '=', samplesSha256)
    .where('recipe', '=', sql<Recipe>`${recipeText}::jsonb`)
    .where('result', '=', sql<NewAnalysis['result']>`${resultText}::jsonb`)
    .limit(1)
    .executeTakeFirst()
  if (twin) return findAnalysis(trx, access, twin.id)
  const { id } = await trx
    .insertInto('analyses')
    .values({
      projectId: access.projectId,
      runId,
      name,
      engineVersion: result.engineVersion,
      samplesSha256,
      recipe: recipeText,
      result: resultText,
      ...wormColumns(worm),
      createdBy: access.userId,
      updatedBy: access.userId,
    })
    .returning('id')
    .executeTakeFirstOrThrow()
  return findAnalysis(trx, access, id)
}

export interface AnalysisChange {
  analysisId: string
  version: number
  name: string
}

export async function updateAnalysisName(
  trx: Transaction<Database>,
  access: ProjectAccess<'edit'>,
  { analysisId, version, name }: AnalysisChange,
) {
  const updated = await trx
    .updateTable('analyses')
    .set({ name, version: sql<number>`version + 1`, updatedAt: sql<Date>`now()`, updatedBy: access.userId })
    .where('projectId', '=', access.projectId)
    .where('id', '=', analysisId)
    .where('version', '=', version)
    .returning('id')
    .executeTakeFirst()
  const current = await findAnalysis(trx, access, analysisId)
  if (updated) return current
  throw await changedMeanwhile(trx, { table: 'analyses', id: analysisId, what: 'analysis', current })
}

/** Deletes the analysis and its notes. Refused while correction tables made from it are kept. */
export async function deleteAnalysis(trx: Transaction<Database>, access: ProjectAccess<'edit'>, analysisId: string) {
  const { name } = await findAnalysis(trx, access, analysisId)
  await trx.selectFrom('analyses').select('id').where('id', '=', analysisId).forUpdate().execute()
  const corrections = await trx
    .selectFrom('corrections')
    .select('name')
    .where('analysisId', '=', analysisId)
    .orderBy('createdAt')
    .execute()
  if (corrections.length > 0) {
    const tables = corrections.map((correction) => `“${correction.name}”`).join(', ')
    const message = `Correction tables were made from “${name}”: ${tables}. Delete them first, then the analysis.`
    throw new Refusal({ kind: 'in-use' }, message)
  }
  await trx.deleteFrom('analyses').where('projectId', '=', access.projectId).where('id', '=', analysisId).execute()
  return { name }
}
