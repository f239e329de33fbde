import { randomBytes } from 'node:crypto'
import { afterAll, beforeAll, inject } from 'vitest'
import { createDatabase } from '@/db/create-db'
import { onCluster, urlOfDatabase } from './database-template'

type Connection = ReturnType<typeof createDatabase>

/**
 * A database of this test file's own, cloned from the migrated template; DATABASE_URL points to it meanwhile, so code of
 * the server meets it too. Give `isEmpty` for one without any table.
 */
export function openTestDatabase({ isEmpty = false } = {}): { readonly db: Connection['db']; readonly url: string } {
  const name = `turnwright_test_${randomBytes(6).toString('hex')}`
  const cluster = inject('testCluster')
  const url = urlOfDatabase(cluster.url, name)
  let connection: Connection | undefined
  beforeAll(async () => {
    await onCluster(cluster.url, `create database ${name} template ${isEmpty ? 'template0' : cluster.template}`)
    process.env.DATABASE_URL = url
    connection = createDatabase({ connectionString: url, poolSize: 5 })
  })
  afterAll(async () => {
    await connection?.db.destroy()
    await onCluster(cluster.url, `drop database ${name} with (force)`)
  })
  return {
    url,
    get db() {
      if (!connection) throw new Error('The test database is only there while tests run')
      return connection.db
    },
  }
}
