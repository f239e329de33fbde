import { sql } from 'kysely'
import { expect, inject, test } from 'vitest'
import { checkDatabase, databaseFault } from '@/db/local/check-database.mjs'
import { freePort } from '@/db/local/ports.mjs'
import { migrateToLatest } from '@/db/migrate'
import { openTestDatabase } from '../support/test-database'

const database = openTestDatabase()

function urlWith(change: (url: URL) => void): string {
  const url = new URL(database.url)
  change(url)
  return url.href
}

test('a database that can be used passes', async () => {
  await expect(checkDatabase(database.url)).resolves.toBeUndefined()
})

test.each([
  ['a wrong password', (url: URL) => (url.password = 'wrong'), /does not let “turnwright” in/],
  ['an unknown user', (url: URL) => (url.username = 'nobody'), /does not let “nobody” in/],
  ['an unknown database', (url: URL) => (url.pathname = '/nothing'), /no database “nothing”.*createdb nothing/],
  ['an unknown machine', (url: URL) => (url.hostname = 'nowhere.invalid'), /no machine with the name nowhere.invalid/],
])('%s is told with its remedy, without the password', async (_, change, message) => {
  const url = urlWith((changed) => void change(changed))
  await expect(checkDatabase(url)).rejects.toThrow(message)
  const { password } = new URL(url)
  await expect(checkDatabase(url)).rejects.not.toThrow(password)
})

test('a port where nothing listens is told', async () => {
  const port = await freePort()
  const url = urlWith((changed) => (changed.port = String(port)))
  await expect(checkDatabase(url)).rejects.toThrow(`No PostgreSQL answers at 127.0.0.1, port ${port}. Start it`)
})

test('a user who may not make tables is told what the owner has to do', async () => {
  const { pathname } = new URL(inject('testCluster').url)
  expect(pathname).toBe('/postgres')
  await sql`create role guest login password 'guest'`.execute(database.db)
  try {
    const url = urlWith((changed) => {
      changed.username = 'guest'
      changed.password = 'guest'
    })
    await expect(checkDatabase(url)).rejects.toThrow(/“guest” may not make tables.*owner to "guest"/)
  } finally {
    await sql`drop role guest`.execute(database.db)
  }
})

test('an address tried in vain under several numbers is told by its first fault', () => {
  const refused = Object.assign(new Error('connect ECONNREFUSED ::1:5432'), { code: 'ECONNREFUSED' })
  const error = new AggregateError([refused, refused])
  expect(databaseFault(error, 'postgres://a:b@localhost/c')).toBe(
    'No PostgreSQL answers at localhost, port 5432. Start it there, or correct DATABASE_URL.\n(connect ECONNREFUSED ::1:5432)',
  )
})

test('a database of a later release is named as one', async () => {
  const later = { name: '2099-01-01-01-later', timestamp: new Date().toISOString() }
  const insert = sql`insert into kysely_migration (name, timestamp) values (${later.name}, ${later.timestamp})`
  await insert.execute(database.db)
  await expect(migrateToLatest(database.db)).rejects.toThrow('of a later release than this one')
})
