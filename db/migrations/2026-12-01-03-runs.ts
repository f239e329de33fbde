import { sql, type Kysely } from 'kysely'

/** 64 MB, the largest file that is kept, and 1 MB, the size of the rows that hold it. */
const LARGEST_FILE_BYTES = 67_108_864
const CHUNK_BYTES = 1_048_576

/** Recorded tracks: what is known of each, its original bytes, and its columns as they were read. */
export async function up(db: Kysely<any>): Promise<void> {
  await db.schema
    .createTable('runs')
    .addColumn('id', 'uuid', (c) => c.primaryKey().defaultTo(sql`gen_random_uuid()`))
    .addColumn('project_id', 'uuid', (c) => c.notNull().references('projects.id').onDelete('cascade'))
    .addColumn('version', 'integer', (c) =>
      c
        .notNull()
        .defaultTo(1)
        .check(sql`version >= 1`),
    )
    .addColumn('name', 'text', (c) => c.notNull().check(sql`length(name) between 1 and 120`))
    .addColumn('file_name', 'text', (c) => c.notNull().check(sql`length(file_name) between 1 and 255`))
    .addColumn('byte_length', 'integer', (c) =>
      c.notNull().check(sql`byte_length between 1 and ${sql.lit(LARGEST_FILE_BYTES)}`),
    )
    .addColumn('file_sha256', 'text', (c) => c.notNull().check(sql`file_sha256 ~ '^[0-9a-f]{64}$'`))
    .addColumn('status', 'text', (c) => c.notNull().check(sql`status in ('uploaded', 'ready')`))
    .addColumn('import_settings', 'jsonb')
    .addColumn('conversion', 'jsonb')
    .addColumn('facts', 'jsonb', (c) => c.notNull())
    .addColumn('row_count', 'integer', (c) => c.check(sql`row_count > 0`))
    .addColumn('samples_sha256', 'text', (c) => c.check(sql`samples_sha256 ~ '^[0-9a-f]{64}$'`))
    .addColumn('created_at', sql`timestamptz(3)`, (c) => c.notNull().defaultTo(sql`now()`))
    .addColumn('created_by', 'uuid', (c) => c.notNull().references('users.id'))
    .addColumn('updated_at', sql`timestamptz(3)`, (c) => c.notNull().defaultTo(sql`now()`))
    .addColumn('updated_by', 'uuid', (c) => c.notNull().references('users.id'))
    .addUniqueConstraint('runs_in_project_unique', ['project_id', 'id'])
    .addCheckConstraint(
      'runs_ready_is_complete',
      sql`(status = 'ready') = (import_settings is not null and conversion is not null
        and row_count is not null and samples_sha256 is not null)`,
    )
    .execute()
  await db.schema.createIndex('runs_list').on('runs').columns(['project_id', 'created_at', 'id']).execute()

  // Deferred: the rows of a file arrive before its length and hash are known, and the run is written last.
  await db.schema
    .createTable('run_file_chunks')
    .addColumn('run_id', 'uuid', (c) => c.notNull())
    .addColumn('index', 'integer', (c) => c.notNull().check(sql`index between 0 and 63`))
    .addColumn('bytes', 'bytea', (c) =>
      c.notNull().check(sql`octet_length(bytes) between 1 and ${sql.lit(CHUNK_BYTES)}`),
    )
    .addPrimaryKeyConstraint('run_file_chunks_pkey', ['run_id', 'index'])
    .addForeignKeyConstraint('run_file_chunks_run_fkey', ['run_id'], 'runs', ['id'], (c) =>
      c.onDelete('cascade').deferrable().initiallyDeferred(),
    )
    .execute()

  await db.schema
    .createTable('run_columns')
    .addColumn('run_id', 'uuid', (c) => c.primaryKey().references('runs.id').onDelete('cascade'))
    .addColumn('encoding', 'text', (c) => c.notNull().check(sql`encoding in ('gzip')`))
    .addColumn('bytes', 'bytea', (c) => c.notNull())
    .execute()

  // Both hold bytes that do not compress further: external storage spares the attempt and lets parts be read.
  await sql`alter table run_file_chunks alter column bytes set storage external`.execute(db)
  await sql`alter table run_columns alter column bytes set storage external`.execute(db)
}

export async function down(db: Kysely<any>): Promise<void> {
  for (const table of ['run_columns', 'run_file_chunks', 'runs']) await db.schema.dropTable(table).execute()
}
