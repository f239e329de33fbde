import { CamelCasePlugin, Kysely, PostgresDialect } from 'kysely'
import pg from 'pg'
import type { Database } from './schema'

export interface DatabaseOptions {
  connectionString: string
  /** Most connections that this process holds at once. */
  poolSize?: number
}

/** A connection pool and Kysely upon it; `db.destroy()` ends both. Scripts call this, the server goes through db/index.ts. */
export function createDatabase({ connectionString, poolSize = 20 }: DatabaseOptions) {
  const pool = new pg.Pool({ connectionString, max: poolSize, connectionTimeoutMillis: 10_000 })
  // A connection that breaks while idle is replaced at the next query; without a listener it would end the process.
  pool.on('error', () => {})
  const db = new Kysely<Database>({
    dialect: new PostgresDialect({ pool }),
    // Without the option the plugin would also rename keys inside JSON columns.
    plugins: [new CamelCasePlugin({ maintainNestedObjectKeys: true })],
  })
  return { pool, db }
}
