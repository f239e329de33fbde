import { sql, type Kysely } from 'kysely'

/** People, their sessions (Lucia's column names), the tokens sent by mail, and the counters that limit attempts. */
export async function up(db: Kysely<any>): Promise<void> {
  await db.schema
    .createTable('users')
    .addColumn('id', 'uuid', (c) => c.primaryKey().defaultTo(sql`gen_random_uuid()`))
    .addColumn('display_name', 'text', (c) => c.notNull().check(sql`length(display_name) between 1 and 80`))
    .addColumn('email', 'text', (c) => c.notNull().check(sql`length(email) between 3 and 254`))
    .addColumn('email_verified_at', sql`timestamptz(3)`)
    .addColumn('password_hash', 'text', (c) => c.notNull().check(sql`password_hash like '$argon2id$%'`))
    .addColumn('created_at', sql`timestamptz(3)`, (c) => c.notNull().defaultTo(sql`now()`))
    .execute()
  await db.schema
    .createIndex('users_email_unique')
    .on('users')
    .unique()
    .expression(sql`lower(email)`)
    .execute()

  // The identifier is the SHA-256 of the token in the cookie, so a copy of this table opens no session.
  await db.schema
    .createTable('sessions')
    .addColumn('id', 'text', (c) => c.primaryKey().check(sql`id ~ '^[0-9a-f]{64}$'`))
    .addColumn('user_id', 'uuid', (c) => c.notNull().references('users.id').onDelete('cascade'))
    .addColumn('expires_at', sql`timestamptz(3)`, (c) => c.notNull())
    .addColumn('created_at', sql`timestamptz(3)`, (c) => c.notNull().defaultTo(sql`now()`))
    .addColumn('user_agent', 'text', (c) => c.check(sql`length(user_agent) <= 300`))
    .execute()
  await db.schema.createIndex('sessions_user').on('sessions').columns(['user_id', 'created_at']).execute()
  await db.schema.createIndex('sessions_expires_at').on('sessions').column('expires_at').execute()

  await db.schema
    .createTable('email_tokens')
    .addColumn('id', 'text', (c) => c.primaryKey().check(sql`id ~ '^[0-9a-f]{64}$'`))
    .addColumn('user_id', 'uuid', (c) => c.notNull().references('users.id').onDelete('cascade'))
    .addColumn('purpose', 'text', (c) => c.notNull().check(sql`purpose in ('verify-email', 'reset-password')`))
    .addColumn('email', 'text', (c) => c.notNull())
    .addColumn('expires_at', sql`timestamptz(3)`, (c) => c.notNull())
    .addColumn('created_at', sql`timestamptz(3)`, (c) => c.notNull().defaultTo(sql`now()`))
    .execute()
  await db.schema.createIndex('email_tokens_user').on('email_tokens').columns(['user_id', 'purpose']).execute()

  await db.schema
    .createTable('rate_limits')
    .addColumn('key', 'text', (c) => c.primaryKey())
    .addColumn('hits', 'integer', (c) => c.notNull().check(sql`hits > 0`))
    .addColumn('expires_at', sql`timestamptz(3)`, (c) => c.notNull())
    .execute()
  await db.schema.createIndex('rate_limits_expires_at').on('rate_limits').column('expires_at').execute()
}

export async function down(db: Kysely<any>): Promise<void> {
  for (const table of ['rate_limits', 'email_tokens', 'sessions', 'users']) await db.schema.dropTable(table).execute()
}
