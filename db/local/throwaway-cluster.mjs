import { randomBytes } from 'node:crypto'
import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { databaseUrl, initialiseCluster, makeOwnedFolder, startServer, stopServer } from './cluster.mjs'
import { freePort } from './ports.mjs'
import { ensurePostgresPrograms, postgresAccount } from './postgres-programs.mjs'

/** A cluster in a temporary folder for tests: fast rather than safe, and gone after `remove()`. */
export async function startThrowawayCluster() {
  const programs = await ensurePostgresPrograms()
  const account = postgresAccount()
  const folder = mkdtempSync(join(tmpdir(), 'turnwright-test-'))
  const dataDir = join(folder, 'pg')
  const password = randomBytes(24).toString('hex')
  const remove = async () => {
    await stopServer(dataDir)
    rmSync(folder, { recursive: true, force: true })
  }
  try {
    makeOwnedFolder(folder, account)
    initialiseCluster({ programs, dataDir, password, account })
    const settings = { fsync: 'off', synchronous_commit: 'off', full_page_writes: 'off', max_connections: 200 }
    const { port } = await startServer({ programs, dataDir, port: await freePort(), account, settings })
    return { url: databaseUrl({ port, password, name: 'postgres' }), remove }
  } catch (error) {
    await remove()
    throw error
  }
}
