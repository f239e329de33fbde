import { sql, type Kysely } from 'kysely'

/**
 * Saved analyses, the notes on them, and the correction tables made from them. A run with analyses, and an analysis with
 * correction tables, can't be deleted ("no action": checked once the statement is done, so deleting a whole project works);
 * notes go with their analysis.
 */
export async function up(db: Kysely<any>): Promise<void> {
  await db.schema
    .createTable('analyses')
    .addColumn('id', 'uuid', (c) => c.primaryKey().defaultTo(sql`gen_random_uuid()`))
    .addColumn('project_id', 'uuid', (c) => c.notNull().references('projects.id').onDelete('cascade'))
    .addColumn('run_id', 'uuid', (c) => c.notNull())
    .addColumn('version', 'integer', (c) =>
      c
        .notNull()
        .defaultTo(1)
        .check(sql`version >= 1`),
    )
    .addColumn('name', 'text', (c) => c.notNull().check(sql`length(name) between 1 and 120`))
    .addColumn('engine_version', 'text', (c) => c.notNull())
    .addColumn('samples_sha256', 'text', (c) => c.notNull().check(sql`samples_sha256 ~ '^[0-9a-f]{64}$'`))
    .addColumn('recipe', 'jsonb', (c) => c.notNull().check(sql`jsonb_typeof(recipe -> 'version') = 'number'`))
    .addColumn('result', 'jsonb', (c) => c.notNull().check(sql`jsonb_typeof(result) = 'object'`))
    .addColumn('result_version', 'integer', (c) =>
      c
        .notNull()
        .defaultTo(1)
        .check(sql`result_version >= 1`),
    )
    .addColumn('worm_period_seconds', 'double precision', (c) => c.check(sql`worm_period_seconds > 0`))
    .addColumn('worm_amplitude_arcsec', 'double precision', (c) => c.check(sql`worm_amplitude_arcsec >= 0`))
    .addColumn('peak_to_peak_arcsec', 'double precision', (c) => c.check(sql`peak_to_peak_arcsec >= 0`))
    .addColumn('created_at', sql`timestamptz(3)`, (c) => c.notNull().defaultTo(sql`now()`))
    .addColumn('created_by', 'uuid', (c) => c.notNull().references('users.id'))
    .addColumn('updated_at', sql`timestamptz(3)`, (c) => c.notNull().defaultTo(sql`now()`))
    .addColumn('updated_by', 'uuid', (c) => c.notNull().references('users.id'))
    .addUniqueConstraint('analyses_in_project_unique', ['project_id', 'id'])
    .addForeignKeyConstraint('analyses_run_fkey', ['project_id', 'run_id'], 'runs', ['project_id', 'id'], (c) =>
      c.onDelete('no action'),
    )
    .execute()
  await db.schema.createIndex('analyses_list').on('analyses').columns(['project_id', 'created_at', 'id']).execute()
  await db.schema.createIndex('analyses_of_run').on('analyses').columns(['run_id', 'created_at', 'id']).execute()

  await db.schema
    .createTable('notes')
    .addColumn('id', 'uuid', (c) => c.primaryKey().defaultTo(sql`gen_random_uuid()`))
    .addColumn('analysis_id', 'uuid', (c) => c.notNull().references('analyses.id').onDelete('cascade'))
    .addColumn('version', 'integer', (c) =>
      c
        .notNull()
        .defaultTo(1)
        .check(sql`version >= 1`),
    )
    .addColumn('anchor_kind', 'text', (c) =>
      c.notNull().check(sql`anchor_kind in ('whole', 'time', 'period', 'worm-angle')`),
    )
    .addColumn('anchor_value', 'double precision')
    .addColumn('text', 'text', (c) => c.notNull().check(sql`length(text) between 1 and 4000`))
    .addColumn('author_id', 'uuid', (c) => c.notNull().references('users.id'))
    .addColumn('created_at', sql`timestamptz(3)`, (c) => c.notNull().defaultTo(sql`now()`))
    .addColumn('updated_at', sql`timestamptz(3)`, (c) => c.notNull().defaultTo(sql`now()`))
    .addColumn('updated_by', 'uuid', (c) => c.notNull().references('users.id'))
    .addCheckConstraint(
      'notes_anchor_fits',
      sql`case anchor_kind
        when 'whole' then anchor_value is null
        when 'time' then anchor_value is not null and anchor_value not in ('NaN', 'Infinity', '-Infinity')
        when 'period' then anchor_value is not null and anchor_value > 0 and anchor_value < 'Infinity'
        else anchor_value is not null and anchor_value >= 0 and anchor_value < 360 end`,
    )
    .execute()
  await db.schema.createIndex('notes_list').on('notes').columns(['analysis_id', 'created_at', 'id']).execute()

  await db.schema
    .createTable('corrections')
    .addColumn('id', 'uuid', (c) => c.primaryKey().defaultTo(sql`gen_random_uuid()`))
    .addColumn('project_id', 'uuid', (c) => c.notNull().references('projects.id').onDelete('cascade'))
    .addColumn('analysis_id', 'uuid', (c) => c.notNull())
    .addColumn('version', 'integer', (c) =>
      c
        .notNull()
        .defaultTo(1)
        .check(sql`version >= 1`),
    )
    .addColumn('name', 'text', (c) => c.notNull().check(sql`length(name) between 1 and 120`))
    .addColumn('kind', 'text', (c) => c.notNull().check(sql`kind in ('stand-alone', 'addition')`))
    .addColumn('settings', 'jsonb', (c) => c.notNull())
    .addColumn('table_result', 'jsonb', (c) =>
      c.notNull().check(sql`jsonb_array_length(table_result -> 'bins') between 8 and 4096`),
    )
    .addColumn('sense_basis', 'text', (c) => c.notNull().check(sql`sense_basis in ('proven', 'assumed')`))
    .addColumn('created_at', sql`timestamptz(3)`, (c) => c.notNull().defaultTo(sql`now()`))
    .addColumn('created_by', 'uuid', (c) => c.notNull().references('users.id'))
    .addForeignKeyConstraint(
      'corrections_analysis_fkey',
      ['project_id', 'analysis_id'],
      'analyses',
      ['project_id', 'id'],
      (c) => c.onDelete('no action'),
    )
    .execute()
  await db.schema
    .createIndex('corrections_list')
    .on('corrections')
    .columns(['project_id', 'created_at', 'id'])
    .execute()
  await db.schema.createIndex('corrections_of_analysis').on('corrections').column('analysis_id').execute()
}

export async function down(db: Kysely<any>): Promise<void> {
  for (const table of ['corrections', 'notes', 'analyses']) await db.schema.dropTable(table).execute()
}
