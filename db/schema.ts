import type { EmailTokensTable, RateLimitsTable, SessionsTable, SignUpsTable, UsersTable } from './tables/accounts'
import type {
  AnalysesTable,
  CorrectionsTable,
  NoteMentionsTable,
  NotesTable,
  ShareLinkNotesTable,
  ShareLinksTable,
} from './tables/analyses'
import type {
  AuditEventsTable,
  DriveTrainsTable,
  InvitationsTable,
  MembershipsTable,
  OpticsPresetsTable,
  PastInvitationLinksTable,
  ProjectsTable,
} from './tables/projects'
import type { RunColumnsTable, RunFileChunksTable, RunsTable } from './tables/runs'

/** Every table, as Kysely sees it (camelCase here, snake_case in the database). */
export interface Database {
  users: UsersTable
  sessions: SessionsTable
  signUps: SignUpsTable
  emailTokens: EmailTokensTable
  rateLimits: RateLimitsTable
  projects: ProjectsTable
  memberships: MembershipsTable
  invitations: InvitationsTable
  pastInvitationLinks: PastInvitationLinksTable
  driveTrains: DriveTrainsTable
  opticsPresets: OpticsPresetsTable
  auditEvents: AuditEventsTable
  runs: RunsTable
  runFileChunks: RunFileChunksTable
  runColumns: RunColumnsTable
  analyses: AnalysesTable
  notes: NotesTable
  noteMentions: NoteMentionsTable
  corrections: CorrectionsTable
  shareLinks: ShareLinksTable
  shareLinkNotes: ShareLinkNotesTable
}
