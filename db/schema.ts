import type { EmailTokensTable, RateLimitsTable, SessionsTable, UsersTable } from './tables/accounts'
import type { AnalysesTable, CorrectionsTable, NotesTable } from './tables/analyses'
import type {
  AuditEventsTable,
  DriveTrainsTable,
  MembershipsTable,
  OpticsPresetsTable,
  ProjectsTable,
} from './tables/projects'
import type { RunColumnsTable, RunFileChunksTable, RunsTable } from './tables/runs'

/** Every table, as Kysely sees it (camelCase here, snake_case in the database). */
export interface Database {
  users: UsersTable
  sessions: SessionsTable
  emailTokens: EmailTokensTable
  rateLimits: RateLimitsTable
  projects: ProjectsTable
  memberships: MembershipsTable
  driveTrains: DriveTrainsTable
  opticsPresets: OpticsPresetsTable
  auditEvents: AuditEventsTable
  runs: RunsTable
  runFileChunks: RunFileChunksTable
  runColumns: RunColumnsTable
  analyses: AnalysesTable
  notes: NotesTable
  corrections: CorrectionsTable
}
