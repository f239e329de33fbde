import { SetUpError } from './processes.mjs'

/** The oldest server that the migrations are tested on. */
const OLDEST_VERSION = 15

/** Codes of PostgreSQL (its documentation, appendix A) and of Node's sockets, and what the person at the terminal can do. */
function remedy(code, { host, port, name, user }) {
  switch (code) {
    case 'ECONNREFUSED':
    case 'ETIMEDOUT':
    case 'EHOSTUNREACH':
    case 'ENETUNREACH':
      return `No PostgreSQL answers at ${host}, port ${port}. Start it there, or correct DATABASE_URL.`
    case 'ENOTFOUND':
    case 'EAI_AGAIN':
      return `There is no machine with the name ${host}. Correct DATABASE_URL.`
    case '28P01':
    case '28000':
      return `PostgreSQL at ${host} does not let “${user}” in. Check user and password in DATABASE_URL, and the server's pg_hba.conf.`
    case '3D000':
      return `PostgreSQL at ${host} has no database “${name}”. Make it (createdb ${name}), or correct DATABASE_URL.`
    case '42501':
      return `“${user}” may not make tables in the database “${name}”. Make it the owner: alter database "${name}" owner to "${user}".`
    case '53300':
      return `PostgreSQL at ${host} has no connection left. Raise its max_connections, or stop what uses them.`
    case '57P03':
      return `PostgreSQL at ${host} is just starting or stopping. Try again in a moment.`
    default:
      return `The database “${name}” at ${host}, port ${port}, can't be used. Check DATABASE_URL and the server.`
  }
}

function firstCode(error) {
  return error.code ?? error.errors?.[0]?.code ?? (/timeout/i.test(error.message) ? 'ETIMEDOUT' : undefined)
}

/** One message that names the remedy, with the driver's own words at its end; never the password. */
export function databaseFault(error, connectionString) {
  const { hostname, port, pathname, username } = new URL(connectionString)
  const user = decodeURIComponent(username)
  const name = decodeURIComponent(pathname.slice(1)) || user
  const told = error.message || error.errors?.[0]?.message || firstCode(error) || 'no reason given'
  return `${remedy(firstCode(error), { host: hostname, port: port || '5432', name, user })}\n(${told})`
}

/** Makes sure that a database of the user's own can be reached, is new enough, and lets us make tables. */
export async function checkDatabase(connectionString) {
  // Loaded late: this module is read before the dependencies are installed.
  const { default: pg } = await import('pg')
  const client = new pg.Client({ connectionString, connectionTimeoutMillis: 10_000 })
  // A connection that breaks after it was made is told by the query that waits.
  client.on('error', () => {})
  try {
    await client.connect()
    const { rows } = await client.query(
      `select current_setting('server_version_num')::int as version,
        has_schema_privilege(current_schema(), 'create') as may_create`,
    )
    const [{ version, may_create: mayCreate }] = rows
    if (version < OLDEST_VERSION * 10_000) {
      const message = `it is version ${Math.floor(version / 10_000)}; Turnwright needs ${OLDEST_VERSION} or later`
      throw Object.assign(new Error(message), { code: undefined })
    }
    if (!mayCreate) throw Object.assign(new Error('no right to create in its schema'), { code: '42501' })
  } catch (error) {
    throw new SetUpError(databaseFault(error, connectionString))
  } finally {
    await client.end().catch(() => {})
  }
}
