import { pathToFileURL } from 'node:url'
import { Logger, runMigrations } from 'graphile-worker'
import { Migrator, NO_MIGRATIONS, type Kysely, type MigrationResultSet } from 'kysely'
import { createDatabase } from './create-db'
import { migrations } from './migrations'
import type { Database } from './schema'

function migrator(db: Kysely<Database>): Migrator {
  return new Migrator({ db, provider: { getMigrations: async () => migrations } })
}

/** A database that a later release has changed already, in words that say what to do. */
function told(error: unknown): unknown {
  const missing = error instanceof Error ? /previously executed migration (\S+) is missing/.exec(error.message) : null
  if (!missing) return error
  return new Error(
    `The database is of a later release than this one: it holds the migration ${missing[1]}. Start that release, or, with it, go back: node --import tsx db/migrate.ts ${Object.keys(migrations).at(-1)}`,
    { cause: error },
  )
}

function finished({ error, results }: MigrationResultSet): string[] {
  if (error) throw told(error)
  return (results ?? []).filter(({ status }) => status === 'Success').map(({ migrationName }) => migrationName)
}

/** Brings the schema up to date; answers the names of the migrations that were applied. */
export async function migrateToLatest(db: Kysely<Database>): Promise<string[]> {
  return finished(await migrator(db).migrateToLatest())
}

/** Goes up or down to the named migration; without a name everything is undone. For tests and for going back a release. */
export async function migrateTo(db: Kysely<Database>, name?: string): Promise<string[]> {
  return finished(await migrator(db).migrateTo(name ?? NO_MIGRATIONS))
}

/** Makes or updates the queue's own schema, `graphile_worker`, which its package looks after. */
export async function prepareQueue(connectionString: string): Promise<void> {
  await runMigrations({ connectionString, logger: silent })
}

const silent = new Logger(() => () => {})

/** `node --import tsx db/migrate.ts [name]`: to the latest, or up or down to the named one. */
async function main(): Promise<void> {
  const connectionString = process.env.DATABASE_URL
  if (!connectionString) throw new Error('DATABASE_URL is not set: say which database to migrate')
  const { db } = createDatabase({ connectionString, poolSize: 1 })
  try {
    const target = process.argv[2]
    await prepareQueue(connectionString)
    const applied = target ? await migrateTo(db, target) : await migrateToLatest(db)
    console.log(applied.length > 0 ? `Migrated: ${applied.join(', ')}` : 'The database is up to date')
  } finally {
    await db.destroy()
  }
}

if (process.argv[1] && import.meta.url === pathToFileURL(process.argv[1]).href) await main()
