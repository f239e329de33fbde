import 'server-only'
import { z } from 'zod'
import { database } from '@/db'
import type { ProjectAccess } from '@/db/queries/access'
import { listAuditEvents } from '@/db/queries/audit'
import { listOpticsPresets } from '@/db/queries/optics-presets'
import type { PageRequest } from '@/db/queries/page'
import { countContents, findProject, listMembers, listProjects } from '@/db/queries/projects'
import {
  auditEventListSchema,
  memberListSchema,
  opticsPresetListSchema,
  projectContentsSchema,
  projectSchema,
} from '@/lib/schemas/api'
import { plain } from './plain'

export async function loadProjects(userId: string) {
  return plain(z.array(projectSchema), await listProjects(database(), userId))
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

export async function loadAuditEvents(access: ProjectAccess, page: PageRequest) {
  return plain(auditEventListSchema, await listAuditEvents(database(), access, page))
}

export async function loadContents(access: ProjectAccess) {
  return plain(projectContentsSchema, await countContents(database(), access))
}
