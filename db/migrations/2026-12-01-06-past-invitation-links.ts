import { sql, type Kysely } from 'kysely'

/**
 * A link that a newer mail has replaced, or whose project is gone, is to say so instead of looking like a mistyped one. A
 * trigger keeps its hash, because whoever writes the mail and whoever deletes the project know nothing of old links.
 */
export async function up(db: Kysely<any>): Promise<void> {
  await db.schema
    .createTable('past_invitation_links')
    .addColumn('token_sha256', 'text', (c) => c.primaryKey().check(sql`token_sha256 ~ '^[0-9a-f]{64}$'`))
    // No foreign key: the row tells of an invitation that may be gone.
    .addColumn('invitation_id', 'uuid', (c) => c.notNull())
    .addColumn('ended_at', sql`timestamptz(3)`, (c) => c.notNull().defaultTo(sql`now()`))
    .execute()
  await db.schema.createIndex('past_invitation_links_ended_at').on('past_invitation_links').column('ended_at').execute()
  await sql`create function keep_past_invitation_link() returns trigger language plpgsql as $$
    begin
      insert into past_invitation_links (token_sha256, invitation_id) values (old.token_sha256, old.id)
        on conflict (token_sha256) do nothing;
      return null;
    end $$`.execute(db)
  await sql`create trigger invitations_link_replaced after update of token_sha256 on invitations for each row
    when (old.token_sha256 is not null and old.token_sha256 is distinct from new.token_sha256)
    execute function keep_past_invitation_link()`.execute(db)
  await sql`create trigger invitations_link_deleted after delete on invitations for each row
    when (old.token_sha256 is not null) execute function keep_past_invitation_link()`.execute(db)
}

export async function down(db: Kysely<any>): Promise<void> {
  await sql`drop trigger invitations_link_replaced on invitations`.execute(db)
  await sql`drop trigger invitations_link_deleted on invitations`.execute(db)
  await sql`drop function keep_past_invitation_link`.execute(db)
  await db.schema.dropTable('past_invitation_links').execute()
}
