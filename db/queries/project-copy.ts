import { randomUUID } from 'node:crypto'
import type { Insertable, Transaction } from 'kysely'
import type {
  ArchiveAnalysis,
  ArchiveCorrection,
  ArchiveNote,
  ArchiveProject,
  ArchiveRun,
  archiveTrailSchema,
} from '@/lib/schemas/archive'
import type { z } from 'zod'
import type { AuditEventsTable } from '../tables/projects'
import type { Database } from '../schema'
import { accessProject, type ProjectAccess } from './access'
import { wormColumns } from './analyses'
import { anchorColumns } from './notes'

/*
 * What an archive holds, written as it was: who made it by name, and when. The person who brings it in stands where the
 * tables want an account.
 */

/** New ids in rising order: lists that are ordered by id last keep the archive's order. */
export function risingIds(count: number): string[] {
  return Array.from({ length: count }, () => randomUUID()).sort()
}

/** The project without what hangs on it, owned by who brings it in. */
export async function copyProject(
  trx: Transaction<Database>,
  userId: string,
  { name, version, createdAt, updatedAt, lastImport, driveTrains, opticsPresets }: ArchiveProject,
): Promise<ProjectAccess<'edit'>> {
  const { id: projectId } = await trx
    .insertInto('projects')
    .values({
      name,
      version,
      createdAt: new Date(createdAt),
      updatedAt: new Date(updatedAt),
      lastImport: lastImport && JSON.stringify(lastImport),
      createdBy: userId,
      updatedBy: userId,
    })
    .returning('id')
    .executeTakeFirstOrThrow()
  await trx.insertInto('memberships').values({ projectId, userId, role: 'owner' }).execute()
  const access = await accessProject(trx, { userId, projectId, right: 'edit' })
  for (const [index, { axisKind, wheelTeeth, wormStarts, stages, ...made }] of driveTrains.entries()) {
    const train = { projectId, number: index + 1, axisKind, wheelTeeth, wormStarts, stages: JSON.stringify(stages) }
    await trx
      .insertInto('driveTrains')
      .values({ ...train, createdAt: new Date(made.createdAt), createdBy: userId, authorName: made.createdBy })
      .execute()
  }
  const presetIds = risingIds(opticsPresets.length)
  for (const [index, preset] of opticsPresets.entries()) {
    const times = { createdAt: new Date(preset.createdAt), updatedAt: new Date(preset.updatedAt) }
    await trx
      .insertInto('opticsPresets')
      .values({ ...preset, ...times, id: presetIds[index], projectId, createdBy: userId, updatedBy: userId })
      .execute()
  }
  return access
}

/** The run whose file's rows were written in the same transaction before; `compressed` are its packed columns. */
export async function copyRun(
  trx: Transaction<Database>,
  { projectId, userId }: ProjectAccess<'edit'>,
  { id, run, compressed }: { id: string; run: ArchiveRun; compressed: Buffer | null },
): Promise<void> {
  const { name, version, file, status, importSettings, conversion, facts, rowCount, samplesSha256 } = run
  await trx
    .insertInto('runs')
    .values({
      id,
      projectId,
      name,
      version,
      fileName: file.name,
      byteLength: file.byteLength,
      fileSha256: file.sha256,
      status,
      importSettings: importSettings && JSON.stringify(importSettings),
      conversion: conversion && JSON.stringify(conversion),
      facts: JSON.stringify(facts),
      rowCount,
      samplesSha256,
      authorName: run.createdBy,
      createdAt: new Date(run.createdAt),
      createdBy: userId,
      updatedAt: new Date(run.updatedAt),
      updatedBy: userId,
    })
    .execute()
  if (compressed) {
    await trx.insertInto('runColumns').values({ runId: id, encoding: 'gzip', bytes: compressed }).execute()
  }
}

export async function copyAnalysis(
  trx: Transaction<Database>,
  { projectId, userId }: ProjectAccess<'edit'>,
  { id, runId, analysis, notes }: { id: string; runId: string; analysis: ArchiveAnalysis; notes: ArchiveNote[] },
): Promise<void> {
  const { name, version, samplesSha256, recipe, result, resultVersion } = analysis
  await trx
    .insertInto('analyses')
    .values({
      id,
      projectId,
      runId,
      name,
      version,
      engineVersion: result.engineVersion,
      samplesSha256,
      recipe: JSON.stringify(recipe),
      result: JSON.stringify(result),
      resultVersion,
      ...wormColumns(result.worm),
      authorName: analysis.createdBy,
      createdAt: new Date(analysis.createdAt),
      createdBy: userId,
      updatedAt: new Date(analysis.updatedAt),
      updatedBy: userId,
    })
    .execute()
  const noteIds = risingIds(notes.length)
  for (const [index, note] of notes.entries()) {
    await trx
      .insertInto('notes')
      .values({
        id: noteIds[index],
        analysisId: id,
        version: note.version,
        ...anchorColumns(note.anchor),
        text: note.text,
        authorId: userId,
        authorName: note.createdBy,
        createdAt: new Date(note.createdAt),
        updatedAt: new Date(note.updatedAt),
        updatedBy: userId,
        updatedByName: note.updatedBy,
        resolvedAt: note.resolvedAt === null ? null : new Date(note.resolvedAt),
        resolvedBy: note.resolvedAt === null ? null : userId,
        resolvedByName: note.resolvedBy,
      })
      .execute()
  }
}

export async function copyCorrection(
  trx: Transaction<Database>,
  { projectId, userId }: ProjectAccess<'edit'>,
  { id, analysisId, correction }: { id: string; analysisId: string; correction: ArchiveCorrection },
): Promise<void> {
  const { name, version, kind, senseBasis, table } = correction
  await trx
    .insertInto('corrections')
    .values({
      id,
      projectId,
      analysisId,
      name,
      version,
      kind,
      senseBasis,
      settings: JSON.stringify(table.settings),
      tableResult: JSON.stringify(table),
      authorName: correction.createdBy,
      createdAt: new Date(correction.createdAt),
      createdBy: userId,
    })
    .execute()
}

/** Few enough rows that their values fit into one statement. */
const EVENTS_AT_ONCE = 1000

export async function copyTrail(
  trx: Transaction<Database>,
  { projectId }: ProjectAccess<'edit'>,
  events: z.infer<typeof archiveTrailSchema>['events'],
): Promise<void> {
  const ids = risingIds(events.length)
  const rows: Insertable<AuditEventsTable>[] = events.map(({ at, actor, action, subject }, index) => ({
    id: ids[index],
    projectId,
    actorId: null,
    actorName: actor,
    action,
    subject,
    at: new Date(at),
  }))
  for (let from = 0; from < rows.length; from += EVENTS_AT_ONCE) {
    await trx
      .insertInto('auditEvents')
      .values(rows.slice(from, from + EVENTS_AT_ONCE))
      .execute()
  }
}
