import 'server-only'
import { database } from '@/db'
import type { ProjectAccess } from '@/db/queries/access'
import { listAuditEvents } from '@/db/queries/list-audit-events'
import { listProjects } from '@/db/queries/list-projects'
import { listOpticsPresets } from '@/db/queries/optics-presets'
import { countContents, findProject, listMembers } from '@/db/queries/projects'
import { memberListSchema, opticsPresetListSchema, projectContentsSchema, projectSchema } from '@/lib/schemas/api'
import { auditEventListSchema, projectListSchema, type AuditQuery, type ProjectQuery } from '@/lib/schemas/lists'
import { plain } from './plain'

export async function loadProjects(userId: string, query: ProjectQuery) {
  return plain(projectListSchema, await listProjects(database(), userId, query))
}

export async function loadProject(access: ProjectAccess) {
  return plain(projectSchema, await findProject(database(), access))
}

export async function loadMembers(access: ProjectAccess) {
  return plain(memberListSchema.shape.members, await listMembers(database(), access))
}

export async function loadOpticsPresets(access: ProjectAccess) {
  return plain(opticsPresetListSchema.shape.presets, await listOpticsPresets(database(), access))
}

export async function loadAuditEvents(access: ProjectAccess, query: AuditQuery) {
  return plain(auditEventListSchema, await listAuditEvents(database(), access, query))
}

export async function loadContents(access: ProjectAccess) {
  return plain(projectContentsSchema, await countContents(database(), access))
}
