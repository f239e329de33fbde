import { sql, type Kysely } from 'kysely'

/**
 * Projects and what hangs on them directly. What people made refers to them without a delete rule: an account that has
 * made something cannot be deleted, so nothing ever loses its author.
 */
export async function up(db: Kysely<any>): Promise<void> {
  await db.schema
    .createTable('projects')
    .addColumn('id', 'uuid', (c) => c.primaryKey().defaultTo(sql`gen_random_uuid()`))
    .addColumn('version', 'integer', (c) =>
      c
        .notNull()
        .defaultTo(1)
        .check(sql`version >= 1`),
    )
    .addColumn('name', 'text', (c) => c.notNull().check(sql`length(name) between 1 and 120`))
    .addColumn('last_import', 'jsonb')
    .addColumn('created_at', sql`timestamptz(3)`, (c) => c.notNull().defaultTo(sql`now()`))
    .addColumn('created_by', 'uuid', (c) => c.notNull().references('users.id'))
    .addColumn('updated_at', sql`timestamptz(3)`, (c) => c.notNull().defaultTo(sql`now()`))
    .addColumn('updated_by', 'uuid', (c) => c.notNull().references('users.id'))
    .execute()

  await db.schema
    .createTable('memberships')
    .addColumn('project_id', 'uuid', (c) => c.notNull().references('projects.id').onDelete('cascade'))
    .addColumn('user_id', 'uuid', (c) => c.notNull().references('users.id').onDelete('cascade'))
    .addColumn('role', 'text', (c) => c.notNull().check(sql`role in ('owner', 'editor', 'viewer')`))
    .addColumn('joined_at', sql`timestamptz(3)`, (c) => c.notNull().defaultTo(sql`now()`))
    .addPrimaryKeyConstraint('memberships_pkey', ['project_id', 'user_id'])
    .execute()
  await db.schema.createIndex('memberships_user').on('memberships').columns(['user_id', 'project_id']).execute()

  await db.schema
    .createTable('drive_trains')
    .addColumn('id', 'uuid', (c) => c.primaryKey().defaultTo(sql`gen_random_uuid()`))
    .addColumn('project_id', 'uuid', (c) => c.notNull().references('projects.id').onDelete('cascade'))
    .addColumn('number', 'integer', (c) => c.notNull().check(sql`number >= 1`))
    .addColumn('axis_kind', 'text', (c) => c.notNull().check(sql`axis_kind in ('worm')`))
    .addColumn('wheel_teeth', 'integer', (c) => c.check(sql`wheel_teeth between 1 and 100000`))
    .addColumn('worm_starts', 'integer', (c) => c.notNull().check(sql`worm_starts between 1 and 16`))
    .addColumn('stages', 'jsonb', (c) => c.notNull().check(sql`jsonb_typeof(stages) = 'array'`))
    .addColumn('created_at', sql`timestamptz(3)`, (c) => c.notNull().defaultTo(sql`now()`))
    .addColumn('created_by', 'uuid', (c) => c.notNull().references('users.id'))
    .addUniqueConstraint('drive_trains_number_unique', ['project_id', 'number'])
    .execute()

  await db.schema
    .createTable('optics_presets')
    .addColumn('id', 'uuid', (c) => c.primaryKey().defaultTo(sql`gen_random_uuid()`))
    .addColumn('project_id', 'uuid', (c) => c.notNull().references('projects.id').onDelete('cascade'))
    .addColumn('version', 'integer', (c) =>
      c
        .notNull()
        .defaultTo(1)
        .check(sql`version >= 1`),
    )
    .addColumn('name', 'text', (c) => c.notNull().check(sql`length(name) between 1 and 120`))
    .addColumn('focal_length_mm', 'double precision', (c) => c.check(sql`focal_length_mm > 0`))
    .addColumn('pixel_size_um', 'double precision', (c) => c.check(sql`pixel_size_um > 0`))
    .addColumn('binning', 'integer', (c) => c.check(sql`binning between 1 and 16`))
    .addColumn('image_scale_arcsec_per_px', 'double precision', (c) =>
      c.notNull().check(sql`image_scale_arcsec_per_px > 0`),
    )
    .addColumn('image_scale_uncertainty_percent', 'double precision', (c) =>
      c.notNull().check(sql`image_scale_uncertainty_percent between 0 and 100`),
    )
    .addColumn('created_at', sql`timestamptz(3)`, (c) => c.notNull().defaultTo(sql`now()`))
    .addColumn('created_by', 'uuid', (c) => c.notNull().references('users.id'))
    .addColumn('updated_at', sql`timestamptz(3)`, (c) => c.notNull().defaultTo(sql`now()`))
    .addColumn('updated_by', 'uuid', (c) => c.notNull().references('users.id'))
    .execute()
  await db.schema
    .createIndex('optics_presets_list')
    .on('optics_presets')
    .columns(['project_id', 'name', 'id'])
    .execute()

  // The actor's name is kept beside the reference: the log must stay readable whatever becomes of the account.
  await db.schema
    .createTable('audit_events')
    .addColumn('id', 'uuid', (c) => c.primaryKey().defaultTo(sql`gen_random_uuid()`))
    .addColumn('project_id', 'uuid', (c) => c.references('projects.id').onDelete('cascade'))
    .addColumn('actor_id', 'uuid', (c) => c.references('users.id').onDelete('set null'))
    .addColumn('actor_name', 'text', (c) => c.notNull())
    .addColumn('action', 'text', (c) => c.notNull().check(sql`action ~ '^[a-z-]+[.][a-z-]+$'`))
    .addColumn('subject', 'text', (c) => c.notNull())
    .addColumn('at', sql`timestamptz(3)`, (c) => c.notNull().defaultTo(sql`now()`))
    .execute()
  await db.schema.createIndex('audit_events_list').on('audit_events').columns(['project_id', 'at', 'id']).execute()
  await db.schema.createIndex('audit_events_actor').on('audit_events').columns(['actor_id', 'at']).execute()
}

export async function down(db: Kysely<any>): Promise<void> {
  for (const table of ['audit_events', 'optics_presets', 'drive_trains', 'memberships', 'projects']) {
    await db.schema.dropTable(table).execute()
  }
}
