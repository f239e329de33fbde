import type { Migration } from 'kysely'
import * as accounts from './2026-12-01-01-accounts'
import * as projects from './2026-12-01-02-projects'
import * as runs from './2026-12-01-03-runs'
import * as analyses from './2026-12-01-04-analyses'
import * as people from './2026-12-01-05-people'
import * as pastInvitationLinks from './2026-12-01-06-past-invitation-links'
import * as importedNoteNames from './2026-12-01-07-imported-note-names'
import * as lists from './2026-12-01-08-lists'
import * as shareLinkVersions from './2026-12-01-09-share-link-versions'

/** Every migration under its file's name, oldest first. A migration that has been merged is never edited. */
export const migrations: Record<string, Migration> = {
  '2026-12-01-01-accounts': accounts,
  '2026-12-01-02-projects': projects,
  '2026-12-01-03-runs': runs,
  '2026-12-01-04-analyses': analyses,
  '2026-12-01-05-people': people,
  '2026-12-01-06-past-invitation-links': pastInvitationLinks,
  '2026-12-01-07-imported-note-names': importedNoteNames,
  '2026-12-01-08-lists': lists,
  '2026-12-01-09-share-link-versions': shareLinkVersions,
}
