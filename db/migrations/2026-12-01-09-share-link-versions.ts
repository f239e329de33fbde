import type { Kysely } from 'kysely'
import { sql } from 'kysely'

/**
 * A share link is changed from the version that was seen: whoever has an older one open would show a note to the world again
 * that somebody else has just taken out.
 */
export async function up(db: Kysely<any>): Promise<void> {
  await sql`alter table share_links add column version integer not null default 1 check (version >= 1)`.execute(db)
}

export async function down(db: Kysely<any>): Promise<void> {
  await sql`alter table share_links drop column version`.execute(db)
}
