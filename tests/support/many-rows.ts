import { sql, type Kysely } from 'kysely'
import type { Database } from '@/db/schema'

interface ManyRows {
  projectId: string
  userIds: readonly string[]
  runCount: number
  /** Analyses are spread over the runs from the first one on. */
  analysisCount?: number
  eventCount?: number
}

const SHA = 'a'.repeat(64)

/**
 * Puts runs, analyses and events straight into the tables, with many equal and many missing values and with names that
 * letters, numbers and case order differently.
 */
export async function seedManyRows(db: Kysely<Database>, wanted: ManyRows): Promise<void> {
  const { projectId, userIds, runCount, analysisCount = 0, eventCount = 0 } = wanted
  const users = sql`(${sql.val(userIds)}::uuid[])`
  await sql`insert into runs (project_id, name, file_name, byte_length, file_sha256, status, import_settings, conversion,
      facts, row_count, samples_sha256, author_name, created_at, created_by, updated_by)
    select ${projectId}, case n % 4 when 0 then 'night ' when 1 then 'Night ' when 2 then 'Ärger ' else 'run_' end || (n % 97),
      'log' || n || '.csv', 1000 + n % 13, ${SHA}, case when is_read then 'ready' else 'uploaded' end,
      case when is_read then '{}'::jsonb end,
      case when is_read then jsonb_build_object('senseBasis', case n % 3 when 0 then 'proven' else 'assumed' end) end,
      jsonb_build_object(
        'startedAt', case when n % 7 <> 0 then
          to_char(timestamptz '2026-01-01 20:00:00+00' + (n % 50) * interval '1 day' + (n % 3) * interval '1 millisecond',
            'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"') end,
        'mountCorrection', (array['off', 'on', 'unknown'])[1 + n % 3],
        'sideOfPier', (array['east', 'west', 'unknown'])[1 + n % 3]),
      case when is_read then 60 + n % 11 end, case when is_read then ${SHA} end,
      case when n % 10 = 0 then 'Guest ' || (n % 3) end,
      timestamptz '2026-06-01 00:00:00+00' + (n / 5) * interval '1 millisecond',
      ${users}[1 + n % ${userIds.length}], ${users}[1]
    from (select n, n % 5 <> 0 as is_read from generate_series(1, ${runCount}) as n) as numbers`.execute(db)
  await sql`insert into analyses (project_id, run_id, name, engine_version, samples_sha256, recipe, result,
      worm_period_seconds, worm_amplitude_arcsec, worm_amplitude_stderr_arcsec, peak_to_peak_arcsec,
      peak_to_peak_stderr_arcsec, created_at, created_by, updated_by)
    select ${projectId}, ids[1 + n % cardinality(ids)], 'Look ' || (n % 31), '0.1.0', ${SHA}, '{}', '{"engineVersion":"0.1.0"}',
      case when n % 6 <> 0 then 566.87 + (n % 17) / 3.0::float8 end,
      case when n % 6 <> 0 then (n % 23) / 7.0::float8 end, 0.1,
      case when n % 6 <> 0 then 2 * (n % 23) / 7.0::float8 end, 0.2,
      timestamptz '2026-07-01 00:00:00+00' + (n / 3) * interval '1 millisecond',
      ${users}[1 + n % ${userIds.length}], ${users}[1]
    from generate_series(1, ${analysisCount}) as n,
      (select array_agg(id order by created_at, id) as ids from runs where project_id = ${projectId}) as run_ids`.execute(
    db,
  )
  await sql`insert into audit_events (project_id, actor_id, actor_name, action, subject, at)
    select ${projectId}, users.id, users.display_name, (array['run.upload', 'run.import', 'analysis.save', 'note.write'])[1 + n % 4],
      'Night ' || (n % 301), timestamptz '2026-08-01 00:00:00+00' + (n / 4) * interval '1 minute'
    from generate_series(1, ${eventCount}) as n join users on users.id = ${users}[1 + n % ${userIds.length}]`.execute(
    db,
  )
}

/** Correction tables of the project's analyses, with many equal values. */
export async function seedManyCorrections(
  db: Kysely<Database>,
  { projectId, count }: { projectId: string; count: number },
): Promise<void> {
  await sql`insert into corrections (project_id, analysis_id, name, kind, settings, table_result, sense_basis, author_name,
      created_at, created_by)
    select ${projectId}, ids[1 + n % cardinality(ids)], case n % 2 when 0 then 'Table ' else 'table ' end || (n % 37),
      case n % 3 when 0 then 'addition' else 'stand-alone' end,
      jsonb_build_object('binCount', (array[8, 96, 240, 1000])[1 + n % 4]), '{}',
      case n % 5 when 0 then 'proven' else 'assumed' end, case when n % 10 = 0 then 'Guest ' || (n % 3) end,
      timestamptz '2026-09-01 00:00:00+00' + (n / 4) * interval '1 millisecond', made_by
    from generate_series(1, ${count}) as n,
      (select array_agg(id order by created_at, id) as ids, min(created_by::text)::uuid as made_by
        from analyses where project_id = ${projectId}) as made`.execute(db)
}

/** Further projects of one person, with many equal and some missing values. */
export async function seedManyProjects(
  db: Kysely<Database>,
  { userId, count }: { userId: string; count: number },
): Promise<void> {
  await sql`with made as (
      insert into projects (name, created_at, updated_at, created_by, updated_by, archived_at, archived_by)
      select case n % 3 when 0 then 'mount ' when 1 then 'Mount ' else 'Ärger ' end || (n % 41),
        timestamptz '2026-01-01 00:00:00+00', timestamptz '2026-09-01 00:00:00+00' + (n / 3) * interval '1 millisecond',
        ${userId}, ${userId}, case when n % 9 = 0 then now() end, case when n % 9 = 0 then ${userId}::uuid end
      from generate_series(1, ${count}) as n
      returning id
    ), numbered as (select id, row_number() over (order by id) as n from made),
    joined as (
      insert into memberships (project_id, user_id, role)
      select id, ${userId}, (array['owner', 'editor', 'viewer'])[1 + n % 3] from numbered
    )
    insert into drive_trains (project_id, number, axis_kind, wheel_teeth, worm_starts, stages, created_by)
    select id, 1, 'worm', case when n % 6 <> 0 then 90 + n % 29 end, 1 + n % 2, '[]', ${userId} from numbered`.execute(
    db,
  )
}
