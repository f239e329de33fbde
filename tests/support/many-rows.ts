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
