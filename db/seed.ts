import { randomInt } from 'node:crypto'
import { mkdirSync, renameSync, writeFileSync } from 'node:fs'
import { dirname } from 'node:path'
import { hash } from '@node-rs/argon2'
import { sql, type Kysely } from 'kysely'
import { DEMO_PEOPLE } from '@/lib/simulate/demo'
import { createDatabase } from './create-db'
import { seedDemo, type DemoUserIds } from './seed-demo'
import type { Database } from './schema'

/*
 * `SIGN_INS_FILE=… node --import tsx db/seed.ts`: the demo's people with passwords made up now, and the club's project.
 * Only ever for a database of our own: the passwords are printed. May be run again; then the passwords are new.
 */

/** Without letters and digits that look alike. */
const ALPHABET = 'abcdefghjkmnpqrstuvwxyz23456789'

/** 16 characters of 31, some 79 bits, in groups that can be read out. */
function newPassword(): string {
  const group = () => Array.from({ length: 4 }, () => ALPHABET[randomInt(ALPHABET.length)]).join('')
  return [group(), group(), group(), group()].join('-')
}

async function upsertPerson(db: Kysely<Database>, person: { displayName: string; email: string; password: string }) {
  const passwordHash = await hash(person.password)
  const { displayName, email } = person
  const { id } = await db
    .insertInto('users')
    .values({ displayName, email, passwordHash, emailVerifiedAt: new Date() })
    .onConflict((conflict) => conflict.expression(sql`lower(email)`).doUpdateSet({ passwordHash }))
    .returning('id')
    .executeTakeFirstOrThrow()
  return id
}

async function main(): Promise<void> {
  const { DATABASE_URL: connectionString, SIGN_INS_FILE: signInsFile } = process.env
  if (!connectionString || !signInsFile) throw new Error('DATABASE_URL and SIGN_INS_FILE must be set')
  const { db } = createDatabase({ connectionString, poolSize: 2 })
  try {
    console.log('Recording the demo’s nights …')
    const ids: Partial<DemoUserIds> = {}
    const signIns = []
    for (const { key, displayName, email, role } of DEMO_PEOPLE) {
      const password = newPassword()
      ids[key] = await upsertPerson(db, { displayName, email, password })
      signIns.push({ displayName, role, email, password })
    }
    await seedDemo(db, ids as DemoUserIds)
    mkdirSync(dirname(signInsFile), { recursive: true })
    // Under another name first: a half-written file would be taken for the whole at every later start.
    writeFileSync(`${signInsFile}.new`, `${JSON.stringify(signIns, null, 2)}\n`, { mode: 0o600 })
    renameSync(`${signInsFile}.new`, signInsFile)
  } finally {
    await db.destroy()
  }
}

await main()
