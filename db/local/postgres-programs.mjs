import { existsSync, readdirSync, readFileSync } from 'node:fs'
import { delimiter, join } from 'node:path'
import { aptInstall } from './apt.mjs'
import { capture, isRoot, SetUpError } from './processes.mjs'

const DEBIAN_FOLDER = '/usr/lib/postgresql'

function isProgramFolder(folder) {
  return existsSync(join(folder, 'initdb')) && existsSync(join(folder, 'postgres'))
}

/** Major version of the programs in a folder. */
function versionOf(folder) {
  return /(\d+)/.exec(capture(join(folder, 'postgres'), ['--version']).stdout)?.[1]
}

/** Folder with initdb and postgres: Debian's newest version, else wherever PATH leads; null when there is none. */
function findPostgresPrograms(wantedVersion) {
  const versions = existsSync(DEBIAN_FOLDER) ? readdirSync(DEBIAN_FOLDER) : []
  const debian = versions.sort((a, b) => Number(b) - Number(a)).map((version) => join(DEBIAN_FOLDER, version, 'bin'))
  const onPath = (process.env.PATH ?? '').split(delimiter).filter(Boolean)
  const folders = [...debian, ...onPath].filter(isProgramFolder)
  const fits = (folder) => wantedVersion === null || versionOf(folder) === wantedVersion
  return folders.find(fits) ?? null
}

/** @param wantedVersion of the cluster that they are for: a server reads only files of its own version. Null: any will do */
export async function ensurePostgresPrograms(wantedVersion = null) {
  const found = findPostgresPrograms(wantedVersion)
  if (found) return found
  if (wantedVersion !== null && findPostgresPrograms(null)) {
    throw new SetUpError(
      `The project's database was made by PostgreSQL ${wantedVersion}, which is not on this machine any more. Install it ` +
        `(on Debian: apt-get install postgresql-${wantedVersion}), or move .data away to begin with an empty one.`,
    )
  }
  await aptInstall(['postgresql'], "PostgreSQL's server")
  const installed = findPostgresPrograms(wantedVersion)
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
