import type { ColumnType, Generated } from 'kysely'
import type { Conversion, GearStage } from '@/lib/analysis/types'
import type { ImportSettings } from '@/lib/formats/types'
import type { Role } from '@/lib/schemas/api'

/** JSON goes in as text (pg would write an array as a PostgreSQL array) and comes out parsed. */
export type Json<T> = ColumnType<T, string, string>

export interface ProjectsTable {
  id: Generated<string>
  version: Generated<number>
  name: string
  lastImport: ColumnType<LastImport | null, string | null | undefined, string | null>
  createdAt: Generated<Date>
  createdBy: string
  updatedAt: Generated<Date>
  updatedBy: string
  /** Since when nothing in it may be changed any more; null: it is in use. */
  archivedAt: Date | null
  archivedBy: string | null
}

export interface LastImport {
  settings: ImportSettings
  conversion: Conversion
}

export interface MembershipsTable {
  projectId: string
  userId: string
  role: Role
  joinedAt: Generated<Date>
}

/** A pending one has neither been accepted nor revoked; past `expiresAt` it opens nothing. */
export interface InvitationsTable {
  id: Generated<string>
  projectId: string
  email: string
  role: Role
  /** SHA-256 of the token in the mail; made anew each time it is sent. */
  tokenSha256: string | null
  invitedBy: string
  createdAt: Generated<Date>
  expiresAt: Date
  sentAt: Date | null
  /** Why the mail has not gone out yet. */
  sendFault: string | null
  acceptedAt: Date | null
  acceptedBy: string | null
  revokedAt: Date | null
  revokedBy: string | null
}

/**
 * Links that a newer mail has replaced, or whose invitation went with its project; kept by a trigger, so that each such link
 * can say what became of it.
 */
export interface PastInvitationLinksTable {
  tokenSha256: string
  /** No longer there once its project was deleted. */
  invitationId: string
  endedAt: Generated<Date>
}

/** One version of a project's drive train; the highest number is the present one. */
export interface DriveTrainsTable {
  id: Generated<string>
  projectId: string
  number: number
  axisKind: 'worm'
  wheelTeeth: number | null
  wormStarts: number
  stages: Json<GearStage[]>
  createdAt: Generated<Date>
  createdBy: string
  authorName: string | null
}

export interface OpticsPresetsTable {
  id: Generated<string>
  projectId: string
  version: Generated<number>
  name: string
  focalLengthMm: number | null
  pixelSizeUm: number | null
  binning: number | null
  imageScaleArcsecPerPx: number
  imageScaleUncertaintyPercent: number
  createdAt: Generated<Date>
  createdBy: string
  updatedAt: Generated<Date>
  updatedBy: string
}

export interface AuditEventsTable {
  id: Generated<string>
  /** Null for what concerns an account alone. */
  projectId: string | null
  actorId: string | null
  actorName: string
  /** `run.delete` and the like: what, then what was done to it. */
  action: string
  subject: string
  at: Generated<Date>
}
