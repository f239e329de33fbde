import 'server-only'
import type { Kysely } from 'kysely'
import { createDatabase } from './create-db'
import type { Database } from './schema'

type Connection = ReturnType<typeof createDatabase>

// Kept on globalThis: hot reload evaluates this module again and must not open a second pool.
const holder = globalThis as typeof globalThis & { turnwrightConnection?: Connection }

/** Opened at the first query, since `next build` imports route modules where there is no database. */
function connection(): Connection {
  const connectionString = process.env.DATABASE_URL
  if (!connectionString) throw new Error('DATABASE_URL is not set')
  holder.turnwrightConnection ??= createDatabase({ connectionString })
  return holder.turnwrightConnection
}

export function database(): Kysely<Database> {
  return connection().db
}

/** The pool beneath Kysely, which the session adapter shares. */
export function databasePool(): Connection['pool'] {
  return connection().pool
}
