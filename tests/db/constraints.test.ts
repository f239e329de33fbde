import { randomUUID } from 'node:crypto'
import { sql } from 'kysely'
import { beforeAll, describe, expect, test } from 'vitest'
import { openTestDatabase } from '../support/test-database'

const database = openTestDatabase()
const hash64 = 'a'.repeat(64)

/** One row of every table, made with plain SQL so that these tests stand apart from the queries. */
async function makeChain() {
  const id = () => randomUUID()
  const ids = { user: id(), project: id(), run: id(), analysis: id(), note: id(), correction: id() }
  const { db } = database
  await sql`insert into users (id, display_name, email, password_hash)
    values (${ids.user}, 'A', ${`${ids.user}@example.org`}, '$argon2id$x')`.execute(db)
  await sql`insert into projects (id, name, created_by, updated_by)
    values (${ids.project}, 'P', ${ids.user}, ${ids.user})`.execute(db)
  await sql`insert into memberships (project_id, user_id, role) values (${ids.project}, ${ids.user}, 'owner')`.execute(
    db,
  )
  await sql`insert into drive_trains (project_id, number, axis_kind, wheel_teeth, worm_starts, stages, created_by)
    values (${ids.project}, 1, 'worm', 152, 1, '[]', ${ids.user})`.execute(db)
  await sql`insert into optics_presets
    (project_id, name, image_scale_arcsec_per_px, image_scale_uncertainty_percent, created_by, updated_by)
    values (${ids.project}, 'O', 1, 1, ${ids.user}, ${ids.user})`.execute(db)
  await sql`insert into audit_events (project_id, actor_id, actor_name, action, subject)
    values (${ids.project}, ${ids.user}, 'A', 'project.create', 'P')`.execute(db)
  await sql`insert into runs
    (id, project_id, name, file_name, byte_length, file_sha256, status, facts, created_by, updated_by)
    values (${ids.run}, ${ids.project}, 'R', 'r.csv', 1, ${hash64}, 'uploaded', '{}', ${ids.user}, ${ids.user})`.execute(
    db,
  )
  await sql`insert into run_file_chunks (run_id, index, bytes) values (${ids.run}, 0, 'x')`.execute(db)
  await sql`insert into run_columns (run_id, encoding, bytes) values (${ids.run}, 'gzip', 'x')`.execute(db)
  await sql`insert into analyses
    (id, project_id, run_id, name, engine_version, samples_sha256, recipe, result, created_by, updated_by)
    values (${ids.analysis}, ${ids.project}, ${ids.run}, 'A', '1', ${hash64}, '{"version": 1}', '{}',
      ${ids.user}, ${ids.user})`.execute(db)
  await sql`insert into notes (id, analysis_id, anchor_kind, text, author_id, updated_by)
    values (${ids.note}, ${ids.analysis}, 'whole', 'N', ${ids.user}, ${ids.user})`.execute(db)
  await sql`insert into corrections
    (id, project_id, analysis_id, name, kind, settings, table_result, sense_basis, created_by)
    values (${ids.correction}, ${ids.project}, ${ids.analysis}, 'C', 'stand-alone', '{}',
      '{"bins": [1, 2, 3, 4, 5, 6, 7, 8]}', 'proven', ${ids.user})`.execute(db)
  return ids
}

type Ids = Awaited<ReturnType<typeof makeChain>>
let ids: Ids

beforeAll(async () => {
  ids = await makeChain()
})

async function run(text: string): Promise<unknown> {
  return sql.raw(text).execute(database.db)
}

async function countRows(table: string, where: string): Promise<number> {
  const { rows } = await sql
    .raw<{ n: number }>(`select count(*)::int n from ${table} where ${where}`)
    .execute(database.db)
  return rows[0].n
}

describe('check constraints', () => {
  const faults: [string, string, string][] = [
    ['users_password_hash_check', 'users', "password_hash = 'plain text'"],
    ['users_email_check', 'users', "email = ''"],
    ['projects_version_check', 'projects', 'version = 0'],
    ['projects_name_check', 'projects', "name = ''"],
    ['memberships_role_check', 'memberships', "role = 'admin'"],
    ['drive_trains_wheel_teeth_check', 'drive_trains', 'wheel_teeth = 0'],
    ['drive_trains_worm_starts_check', 'drive_trains', 'worm_starts = 17'],
    ['drive_trains_stages_check', 'drive_trains', "stages = '{}'"],
    ['optics_presets_image_scale_arcsec_per_px_check', 'optics_presets', 'image_scale_arcsec_per_px = 0'],
    ['optics_presets_image_scale_uncertainty_percent_check', 'optics_presets', 'image_scale_uncertainty_percent = 101'],
    ['audit_events_action_check', 'audit_events', "action = 'Something'"],
    ['runs_byte_length_check', 'runs', 'byte_length = 67108865'],
    ['runs_file_sha256_check', 'runs', "file_sha256 = 'abc'"],
    ['runs_status_check', 'runs', "status = 'lost'"],
    ['runs_ready_is_complete', 'runs', "status = 'ready'"],
    [
      'runs_ready_is_complete',
      'runs',
      `import_settings = '{}', conversion = '{}', row_count = 1, samples_sha256 = '${hash64}'`,
    ],
    ['run_file_chunks_index_check', 'run_file_chunks', 'index = 64'],
    ['run_file_chunks_bytes_check', 'run_file_chunks', "bytes = ''"],
    ['run_file_chunks_bytes_check', 'run_file_chunks', "bytes = convert_to(repeat('x', 1048577), 'UTF8')"],
    ['run_columns_encoding_check', 'run_columns', "encoding = 'zip'"],
    ['analyses_recipe_check', 'analyses', `recipe = '{"version": "1"}'`],
    ['analyses_worm_period_seconds_check', 'analyses', 'worm_period_seconds = 0'],
    ['notes_anchor_kind_check', 'notes', "anchor_kind = 'elsewhere', anchor_value = 1"],
    ['notes_anchor_fits', 'notes', 'anchor_value = 1'],
    ['notes_anchor_fits', 'notes', "anchor_kind = 'time'"],
    ['notes_anchor_fits', 'notes', "anchor_kind = 'time', anchor_value = 'NaN'"],
    ['notes_anchor_fits', 'notes', "anchor_kind = 'period', anchor_value = 0"],
    ['notes_anchor_fits', 'notes', "anchor_kind = 'worm-angle', anchor_value = 360"],
    ['notes_text_check', 'notes', "text = ''"],
    ['corrections_kind_check', 'corrections', "kind = 'other'"],
    ['corrections_table_result_check', 'corrections', `table_result = '{"bins": [1]}'`],
  ]
  test.each(faults)('%s refuses %s set %s', async (constraint, table, assignment) => {
    await expect(run(`update ${table} set ${assignment}`)).rejects.toMatchObject({ code: '23514', constraint })
  })

  test.each([
    "anchor_kind = 'time', anchor_value = -5",
    "anchor_kind = 'period', anchor_value = 566.87",
    "anchor_kind = 'worm-angle', anchor_value = 0",
    "anchor_kind = 'whole', anchor_value = null",
  ])('a note may have %s', async (assignment) => {
    await run(`update notes set ${assignment} where id = '${ids.note}'`)
  })
})

describe('foreign keys', () => {
  test('bytes of a file without its run are refused when the transaction ends', async () => {
    const insert = () => run(`insert into run_file_chunks (run_id, index, bytes) values ('${randomUUID()}', 0, 'x')`)
    await expect(insert()).rejects.toMatchObject({ code: '23503' })
    await expect(
      database.db.transaction().execute(async (trx) => {
        await sql`insert into run_file_chunks (run_id, index, bytes) values (${randomUUID()}, 0, 'x')`.execute(trx)
      }),
    ).rejects.toMatchObject({ code: '23503', constraint: 'run_file_chunks_run_fkey' })
  })

  test("an analysis can't be of another project's run", async () => {
    const other = await makeChain()
    await expect(run(`update analyses set run_id = '${other.run}' where id = '${ids.analysis}'`)).rejects.toMatchObject(
      {
        constraint: 'analyses_run_fkey',
      },
    )
    await expect(
      run(`update corrections set analysis_id = '${other.analysis}' where id = '${ids.correction}'`),
    ).rejects.toMatchObject({ constraint: 'corrections_analysis_fkey' })
  })

  test('a run with analyses and an analysis with correction tables stay', async () => {
    await expect(run(`delete from runs where id = '${ids.run}'`)).rejects.toMatchObject({
      constraint: 'analyses_run_fkey',
    })
    await expect(run(`delete from analyses where id = '${ids.analysis}'`)).rejects.toMatchObject({
      constraint: 'corrections_analysis_fkey',
    })
  })

  test('notes go with their analysis, bytes and columns with their run', async () => {
    const chain = await makeChain()
    await run(`delete from corrections where id = '${chain.correction}'`)
    await run(`delete from analyses where id = '${chain.analysis}'`)
    expect(await countRows('notes', `id = '${chain.note}'`)).toBe(0)
    await run(`delete from runs where id = '${chain.run}'`)
    expect(await countRows('run_file_chunks', `run_id = '${chain.run}'`)).toBe(0)
    expect(await countRows('run_columns', `run_id = '${chain.run}'`)).toBe(0)
  })

  test('a deleted project takes everything below it along, in one statement, and nothing else', async () => {
    const chain = await makeChain()
    await run(`delete from projects where id = '${chain.project}'`)
    const below = ['memberships', 'drive_trains', 'optics_presets', 'audit_events', 'runs', 'analyses', 'corrections']
    for (const table of below) {
      expect([table, await countRows(table, `project_id = '${chain.project}'`)]).toEqual([table, 0])
      expect([table, (await countRows(table, `project_id = '${ids.project}'`)) > 0]).toEqual([table, true])
    }
    expect(await countRows('notes', `id = '${chain.note}'`)).toBe(0)
  })

  test('an account that has made something stays; one that has not takes its sessions and memberships along', async () => {
    await expect(run(`delete from users where id = '${ids.user}'`)).rejects.toMatchObject({ code: '23503' })
    const guest = randomUUID()
    await run(`insert into users (id, display_name, email, password_hash)
      values ('${guest}', 'G', '${guest}@example.org', '$argon2id$x')`)
    await run(`insert into sessions (id, user_id, expires_at) values ('${'b'.repeat(64)}', '${guest}', now())`)
    await run(`insert into email_tokens (id, user_id, purpose, email, expires_at)
      values ('${'c'.repeat(64)}', '${guest}', 'reset-password', 'g', now())`)
    await run(`insert into memberships (project_id, user_id, role) values ('${ids.project}', '${guest}', 'viewer')`)
    await run(`insert into audit_events (actor_id, actor_name, action, subject)
      values ('${guest}', 'G', 'account.sign-up', 'g')`)
    await run(`delete from users where id = '${guest}'`)
    for (const table of ['sessions', 'email_tokens', 'memberships']) {
      expect(await countRows(table, `user_id = '${guest}'`)).toBe(0)
    }
    expect(await countRows('audit_events', "actor_name = 'G' and actor_id is null")).toBe(1)
  })

  test('addresses differ by more than case', async () => {
    const insert = (email: string) =>
      run(`insert into users (display_name, email, password_hash) values ('D', '${email}', '$argon2id$x')`)
    await insert('Double@example.org')
    await expect(insert('double@EXAMPLE.org')).rejects.toMatchObject({ constraint: 'users_email_unique' })
  })
})

test('every foreign key, but those that say who did something, is found by an index', async () => {
  const { rows } = await sql<{ missing: string }>`
    select c.conrelid::regclass || '.' || a.attname as missing
    from pg_constraint c
    join pg_attribute a on a.attrelid = c.conrelid and a.attnum = c.conkey[array_length(c.conkey, 1)]
    where c.contype = 'f' and c.connamespace = 'public'::regnamespace
      and a.attname not like '%\_by' and a.attname <> 'author_id'
      and not exists (
        select from pg_index i where i.indrelid = c.conrelid
          and (i.indkey[0] = a.attnum or (i.indkey[0] = c.conkey[1] and i.indkey[1] = a.attnum)))`.execute(database.db)
  expect(rows).toEqual([])
})
