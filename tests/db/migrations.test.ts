import { readdirSync } from 'node:fs'
import { sql } from 'kysely'
import { expect, test } from 'vitest'
import { migrateTo, migrateToLatest } from '@/db/migrate'
import { migrations } from '@/db/migrations'
import { openTestDatabase } from '../support/test-database'

const database = openTestDatabase({ isEmpty: true })
const names = Object.keys(migrations)

/** Columns, constraints and indexes as PostgreSQL describes them: equal descriptions, equal schema. */
async function describeSchema(): Promise<string[]> {
  const { rows } = await sql<{ line: string }>`
    select format('column %s.%s %s %s %s', table_name, column_name, data_type, is_nullable, column_default) as line
      from information_schema.columns where table_schema = 'public' and table_name not like 'kysely%'
    union all
    select format('constraint %s %s %s', conrelid::regclass, conname, pg_get_constraintdef(oid)) from pg_constraint
      where connamespace = 'public'::regnamespace and conrelid::regclass::text not like 'kysely%'
    union all
    select indexdef from pg_indexes where schemaname = 'public' and tablename not like 'kysely%'
    union all
    select format('storage %s.%s %s', attrelid::regclass, attname, attstorage) from pg_attribute
      where attname = 'bytes' and attrelid::regclass::text in ('run_file_chunks', 'run_columns')
    order by line`.execute(database.db)
  return rows.map(({ line }) => line)
}

test('every file in the folder is listed under its name, in the order of its date', () => {
  const files = readdirSync('db/migrations').filter((file) => file !== 'index.ts')
  expect(files.map((file) => file.replace(/\.ts$/, '')).sort()).toEqual(names)
})

test('all migrations go up, down and up again to the same schema', async () => {
  expect(await migrateToLatest(database.db)).toEqual(names)
  const first = await describeSchema()
  expect(first).toContain('storage run_file_chunks.bytes e')
  expect(await migrateTo(database.db)).toEqual([...names].reverse())
  expect(await describeSchema()).toEqual([])
  expect(await migrateToLatest(database.db)).toEqual(names)
  expect(await describeSchema()).toEqual(first)
  expect(await migrateToLatest(database.db)).toEqual([])
})

test.each(names)('%s alone goes down and up again', async (name) => {
  await migrateToLatest(database.db)
  await migrateTo(database.db, name)
  const before = await describeSchema()
  const previous = names[names.indexOf(name) - 1]
  await migrateTo(database.db, previous)
  expect(await describeSchema()).not.toEqual(before)
  await migrateTo(database.db, name)
  expect(await describeSchema()).toEqual(before)
})
