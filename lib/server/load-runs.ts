import 'server-only'
import { database } from '@/db'
import type { ProjectAccess } from '@/db/queries/access'
import { listRuns } from '@/db/queries/list-runs'
import { findRun } from '@/db/queries/runs'
import { runSchema } from '@/lib/schemas/api'
import { runListSchema, type RunQuery } from '@/lib/schemas/lists'
import { plain } from './plain'

export async function loadRuns(access: ProjectAccess, query: RunQuery) {
  return plain(runListSchema, await listRuns(database(), access, query))
}

export async function loadRun(access: ProjectAccess, runId: string) {
  return plain(runSchema, await findRun(database(), access, runId))
}
