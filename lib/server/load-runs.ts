import 'server-only'
import { database } from '@/db'
import type { ProjectAccess } from '@/db/queries/access'
import type { PageRequest } from '@/db/queries/page'
import { findRun, listRuns } from '@/db/queries/runs'
import { runListSchema, runSchema } from '@/lib/schemas/api'
import { plain } from './plain'

export async function loadRuns(access: ProjectAccess, page: PageRequest) {
  return plain(runListSchema, await listRuns(database(), access, page))
}

export async function loadRun(access: ProjectAccess, runId: string) {
  return plain(runSchema, await findRun(database(), access, runId))
}
