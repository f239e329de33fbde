import { existsSync, readdirSync, readFileSync } from 'node:fs'
import { delimiter, join } from 'node:path'
import { aptInstall } from './apt.mjs'
import { isRoot, SetUpError } from './processes.mjs'

const DEBIAN_FOLDER = '/usr/lib/postgresql'

function isProgramFolder(folder) {
  return existsSync(join(folder, 'initdb')) && existsSync(join(folder, 'postgres'))
}

/** Folder with initdb and postgres: Debian's newest version, else wherever PATH leads; null when there is none. */
export function findPostgresPrograms() {
  const versions = existsSync(DEBIAN_FOLDER) ? readdirSync(DEBIAN_FOLDER) : []
  const debian = versions.sort((a, b) => Number(b) - Number(a)).map((version) => join(DEBIAN_FOLDER, version, 'bin'))
  const onPath = (process.env.PATH ?? '').split(delimiter).filter(Boolean)
  return [...debian, ...onPath].find(isProgramFolder) ?? null
}

export async function ensurePostgresPrograms() {
  const found = findPostgresPrograms()
  if (found) return found
  await aptInstall(['postgresql'], "PostgreSQL's server")
  const installed = findPostgresPrograms()
  if (!installed) throw new SetUpError("PostgreSQL was installed, but its programs can't be found.")
  return installed
}

/** The account that PostgreSQL runs as: `{ uid, gid }` of postgres when we are root (it refuses root), else our own. */
export function postgresAccount() {
  if (!isRoot()) return {}
  const line = readFileSync('/etc/passwd', 'utf8')
    .split('\n')
    .find((entry) => entry.startsWith('postgres:'))
  if (!line) {
    throw new SetUpError(
      'PostgreSQL will not run as root and there is no "postgres" user. Run "adduser --system --group postgres".',
    )
  }
  const [, , uid, gid] = line.split(':')
  return { uid: Number(uid), gid: Number(gid) }
}
