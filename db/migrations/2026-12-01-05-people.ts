import { sql, type Kysely } from 'kysely'

const instant = sql`timestamptz(3)`

/**
 * Accounts by mail, invitations, share links, resolved notes and mentions, archived projects, and the names of authors who
 * have no account here. A token that travels by mail is kept as its SHA-256 only.
 */
export async function up(db: Kysely<any>): Promise<void> {
  // A deleted account stays as an empty shell: what its person made in shared projects must not lose its author.
  await sql`alter table users
    alter column email drop not null,
    alter column password_hash drop not null,
    add column deleted_at timestamptz(3),
    add column theme text check (theme in ('day', 'dusk', 'night')),
    add column swing_measure text not null default 'amplitude' check (swing_measure in ('amplitude', 'peak-to-peak')),
    add column displacement_unit text not null default 'arcsec' check (displacement_unit in ('arcsec', 'px')),
    add column time_zone text check (length(time_zone) between 1 and 64),
    add constraint users_deleted_is_empty
      check ((deleted_at is null) = (email is not null and password_hash is not null))`.execute(db)

  // What a person may see and end of their sessions goes by public_id: the key itself is what the cookie hashes to.
  await sql`alter table sessions
    add column public_id uuid not null default gen_random_uuid() unique,
    add column last_seen_at timestamptz(3) not null default now()`.execute(db)

  await sql`alter table email_tokens drop constraint email_tokens_purpose_check`.execute(db)
  await sql`delete from email_tokens where purpose = 'verify-email'`.execute(db)
  await sql`alter table email_tokens
    add constraint email_tokens_purpose_check check (purpose in ('reset-password', 'change-email'))`.execute(db)
  await db.schema.createIndex('email_tokens_expires_at').on('email_tokens').column('expires_at').execute()

  // An account is made only when the link in the mail is followed, so an address that is typed by others blocks nobody.
  await db.schema
    .createTable('sign_ups')
    .addColumn('id', 'uuid', (c) => c.primaryKey().defaultTo(sql`gen_random_uuid()`))
    .addColumn('email', 'text', (c) => c.notNull().check(sql`length(email) between 3 and 254`))
    .addColumn('display_name', 'text', (c) => c.notNull().check(sql`length(display_name) between 1 and 80`))
    .addColumn('password_hash', 'text', (c) => c.notNull().check(sql`password_hash like '$argon2id$%'`))
    .addColumn('browser_sha256', 'text', (c) => c.notNull().check(sql`browser_sha256 ~ '^[0-9a-f]{64}$'`))
    .addColumn('token_sha256', 'text', (c) => c.unique().check(sql`token_sha256 ~ '^[0-9a-f]{64}$'`))
    .addColumn('next_path', 'text', (c) => c.check(sql`length(next_path) <= 2000`))
    .addColumn('created_at', instant, (c) => c.notNull().defaultTo(sql`now()`))
    .addColumn('expires_at', instant, (c) => c.notNull())
    .execute()
  await db.schema
    .createIndex('sign_ups_email')
    .on('sign_ups')
    .expression(sql`lower(email)`)
    .execute()
  await db.schema.createIndex('sign_ups_expires_at').on('sign_ups').column('expires_at').execute()

  await sql`alter table projects
    add column archived_at timestamptz(3),
    add column archived_by uuid references users (id)`.execute(db)

  await db.schema
    .createTable('invitations')
    .addColumn('id', 'uuid', (c) => c.primaryKey().defaultTo(sql`gen_random_uuid()`))
    .addColumn('project_id', 'uuid', (c) => c.notNull().references('projects.id').onDelete('cascade'))
    .addColumn('email', 'text', (c) => c.notNull().check(sql`length(email) between 3 and 254`))
    .addColumn('role', 'text', (c) => c.notNull().check(sql`role in ('owner', 'editor', 'viewer')`))
    .addColumn('token_sha256', 'text', (c) => c.unique().check(sql`token_sha256 ~ '^[0-9a-f]{64}$'`))
    .addColumn('invited_by', 'uuid', (c) => c.notNull().references('users.id'))
    .addColumn('created_at', instant, (c) => c.notNull().defaultTo(sql`now()`))
    .addColumn('expires_at', instant, (c) => c.notNull())
    .addColumn('sent_at', instant)
    .addColumn('send_fault', 'text')
    .addColumn('accepted_at', instant)
    .addColumn('accepted_by', 'uuid', (c) => c.references('users.id'))
    .addColumn('revoked_at', instant)
    .addColumn('revoked_by', 'uuid', (c) => c.references('users.id'))
    .addCheckConstraint('invitations_end_once', sql`accepted_at is null or revoked_at is null`)
    .addCheckConstraint('invitations_accepted_by', sql`(accepted_at is null) = (accepted_by is null)`)
    .execute()
  await sql`create unique index invitations_pending_unique on invitations (project_id, lower(email))
    where accepted_at is null and revoked_at is null`.execute(db)
  await db.schema
    .createIndex('invitations_list')
    .on('invitations')
    .columns(['project_id', 'created_at', 'id'])
    .execute()

  for (const table of ['runs', 'analyses', 'notes', 'corrections', 'drive_trains']) {
    // Who made it where it came from, when a project was brought in from an archive.
    await sql`alter table ${sql.table(table)} add column author_name text
      check (length(author_name) between 1 and 80)`.execute(db)
  }

  await sql`alter table analyses
    add column worm_period_stderr_seconds double precision check (worm_period_stderr_seconds >= 0),
    add column worm_amplitude_stderr_arcsec double precision check (worm_amplitude_stderr_arcsec >= 0),
    add column peak_to_peak_stderr_arcsec double precision check (peak_to_peak_stderr_arcsec >= 0)`.execute(db)
  await sql`update analyses set
    worm_period_stderr_seconds = (result #>> '{worm,periodSeconds,stderr}')::double precision,
    peak_to_peak_stderr_arcsec = (result #>> '{worm,peakToPeakArcsec,stderr}')::double precision,
    worm_amplitude_stderr_arcsec =
      (jsonb_path_query_first(result, '$.worm.harmonics[*] ? (@.order == 1).amplitudeArcsec.stderr') #>> '{}')::double precision`.execute(
    db,
  )

  await sql`alter table notes
    add column resolved_at timestamptz(3),
    add column resolved_by uuid references users (id),
    add constraint notes_resolved_by check ((resolved_at is null) = (resolved_by is null))`.execute(db)

  await db.schema
    .createTable('note_mentions')
    .addColumn('note_id', 'uuid', (c) => c.notNull().references('notes.id').onDelete('cascade'))
    .addColumn('user_id', 'uuid', (c) => c.notNull().references('users.id').onDelete('cascade'))
    .addPrimaryKeyConstraint('note_mentions_pkey', ['note_id', 'user_id'])
    .execute()
  await db.schema.createIndex('note_mentions_user').on('note_mentions').column('user_id').execute()

  // The token is kept readable: whoever reads this table reads the analysis too, and its owner wants to copy the link again.
  await db.schema
    .createTable('share_links')
    .addColumn('id', 'uuid', (c) => c.primaryKey().defaultTo(sql`gen_random_uuid()`))
    .addColumn('project_id', 'uuid', (c) => c.notNull().references('projects.id').onDelete('cascade'))
    .addColumn('analysis_id', 'uuid', (c) => c.notNull())
    .addColumn('token', 'text', (c) =>
      c
        .notNull()
        .unique()
        .check(sql`token ~ '^[A-Za-z0-9_-]{43}$'`),
    )
    .addColumn('preface', 'text', (c) => c.check(sql`length(preface) between 1 and 2000`))
    .addColumn('created_at', instant, (c) => c.notNull().defaultTo(sql`now()`))
    .addColumn('created_by', 'uuid', (c) => c.notNull().references('users.id'))
    .addColumn('expires_at', instant)
    .addColumn('revoked_at', instant)
    .addColumn('revoked_by', 'uuid', (c) => c.references('users.id'))
    .addColumn('opened_count', 'integer', (c) => c.notNull().defaultTo(0))
    .addColumn('last_opened_at', instant)
    .addForeignKeyConstraint(
      'share_links_analysis_fkey',
      ['project_id', 'analysis_id'],
      'analyses',
      ['project_id', 'id'],
      (c) => c.onDelete('cascade'),
    )
    .execute()
  await db.schema
    .createIndex('share_links_of_analysis')
    .on('share_links')
    .columns(['analysis_id', 'created_at'])
    .execute()

  await db.schema.createIndex('share_links_list').on('share_links').columns(['project_id', 'analysis_id']).execute()

  await db.schema
    .createTable('share_link_notes')
    .addColumn('share_link_id', 'uuid', (c) => c.notNull().references('share_links.id').onDelete('cascade'))
    .addColumn('note_id', 'uuid', (c) => c.notNull().references('notes.id').onDelete('cascade'))
    .addPrimaryKeyConstraint('share_link_notes_pkey', ['share_link_id', 'note_id'])
    .execute()
  await db.schema.createIndex('share_link_notes_note').on('share_link_notes').column('note_id').execute()
}

export async function down(db: Kysely<any>): Promise<void> {
  for (const table of ['share_link_notes', 'share_links', 'note_mentions', 'invitations', 'sign_ups']) {
    await db.schema.dropTable(table).execute()
  }
  await sql`alter table notes drop column resolved_at, drop column resolved_by`.execute(db)
  await sql`alter table analyses drop column worm_period_stderr_seconds, drop column worm_amplitude_stderr_arcsec,
    drop column peak_to_peak_stderr_arcsec`.execute(db)
  for (const table of ['runs', 'analyses', 'notes', 'corrections', 'drive_trains']) {
    await sql`alter table ${sql.table(table)} drop column author_name`.execute(db)
  }
  await sql`alter table projects drop column archived_at, drop column archived_by`.execute(db)
  await db.schema.dropIndex('email_tokens_expires_at').execute()
  await sql`alter table email_tokens drop constraint email_tokens_purpose_check`.execute(db)
  await sql`delete from email_tokens where purpose = 'change-email'`.execute(db)
  await sql`alter table email_tokens
    add constraint email_tokens_purpose_check check (purpose in ('verify-email', 'reset-password'))`.execute(db)
  await sql`alter table sessions drop column public_id, drop column last_seen_at`.execute(db)
  // The shells of deleted accounts get an address that can receive nothing and a password that nothing hashes to.
  await sql`update users set email = id || '@deleted.invalid', password_hash = '$argon2id$none'
    where deleted_at is not null`.execute(db)
  await sql`alter table users drop constraint users_deleted_is_empty, drop column deleted_at, drop column theme,
    drop column swing_measure, drop column displacement_unit, drop column time_zone,
    alter column email set not null, alter column password_hash set not null`.execute(db)
}
