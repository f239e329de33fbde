import { createHash, randomBytes } from 'node:crypto'
import { mkdirSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import {
  clusterVersion,
  databaseUrl,
  initialiseCluster,
  resetPassword,
  runningServer,
  startServer,
  stopServer,
} from './cluster.mjs'
import { createDatabaseIfMissing } from './create-database.mjs'
import { freePort, isPortFree } from './ports.mjs'
import { ensurePostgresPrograms, postgresAccount } from './postgres-programs.mjs'
import { capture, commandOf, isAlive } from './processes.mjs'

const DATABASE = 'turnwright'

function readState(file) {
  try {
    return JSON.parse(readFileSync(file, 'utf8'))
  } catch {
    return null
  }
}

/**
 * Where the cluster's files lie: in .data, unless PostgreSQL's account may not enter the checkout (a root user's home
 * is closed to it); then in that account's own folder, under a name made from the checkout's path.
 */
function chooseDataDir(dataFolder, account) {
  const inside = join(dataFolder, 'pg')
  if (account.uid === undefined || capture('test', ['-x', dataFolder], { ...account, cwd: '/' }).ok) return inside
  const hash = createHash('sha256').update(dataFolder).digest('hex').slice(0, 12)
  return `/var/lib/postgresql/turnwright-${hash}`
}

/** Whether a start is still running under this number, which by now may be another program's. */
function isStart(pid) {
  return isAlive(pid) && (commandOf(pid)?.includes('start.mjs') ?? true)
}

/** Notes that this process needs the cluster; the last one to leave stops it. */
function register(dataFolder) {
  const folder = join(dataFolder, 'starts')
  mkdirSync(folder, { recursive: true })
  writeFileSync(join(folder, String(process.pid)), '')
  return function leave() {
    rmSync(join(folder, String(process.pid)), { force: true })
    const others = readdirSync(folder).filter((pid) => isStart(Number(pid)) || rmSync(join(folder, pid)))
    return others.length === 0
  }
}

/**
 * The project's own PostgreSQL on 127.0.0.1, made on first use. Port and secret are kept in .data.
 *
 * @returns the address of its database, whether it is new, and `close`, which stops the server unless another start of
 * this checkout still uses it
 */
export async function openOwnCluster(root) {
  // First of any version: installing it is what makes the postgres account.
  await ensurePostgresPrograms()
  const account = postgresAccount()
  const dataFolder = join(root, '.data')
  mkdirSync(dataFolder, { recursive: true, mode: 0o755 })
  const dataDir = chooseDataDir(dataFolder, account)
  const stateFile = join(dataFolder, 'postgres.json')
  const known = readState(stateFile)
  const state = known?.dataDir === dataDir ? known : { dataDir, password: randomBytes(24).toString('hex'), port: 0 }
  const version = clusterVersion(dataDir)
  const isNew = version === null
  const programs = await ensurePostgresPrograms(version)
  const save = () => writeFileSync(stateFile, `${JSON.stringify(state, null, 2)}\n`, { mode: 0o600 })

  const leave = register(dataFolder)
  const close = async () => {
    if (leave()) await stopServer(dataDir)
  }
  try {
    let server = runningServer(dataDir)
    if (server && state !== known) {
      // Left running by a start whose notes are gone; its password is not known any more.
      await stopServer(dataDir)
      server = null
    }
    if (isNew) {
      console.log('Making the project’s own database cluster …')
      save()
      initialiseCluster({ programs, dataDir, password: state.password, account })
    } else if (state !== known) {
      resetPassword({ programs, dataDir, password: state.password, account })
    }
    if (server) state.port = server.port
    else {
      const isRemembered = state.port > 0 && (await isPortFree(state.port, '127.0.0.1'))
      if (!isRemembered) state.port = await freePort()
      await startServer({ programs, dataDir, port: state.port, account })
    }
    save()
    const address = { port: state.port, password: state.password }
    await createDatabaseIfMissing(databaseUrl({ ...address, name: 'postgres' }), DATABASE)
    return { url: databaseUrl({ ...address, name: DATABASE }), isNew, close }
  } catch (error) {
    await close()
    throw error
  }
}
