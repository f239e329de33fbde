import { sql, type Kysely } from 'kysely'

/**
 * What the lists are sorted by: names in the order of people (a collation of ICU: case does not matter, numbers count as
 * numbers), and the start of a run as a column of its own.
 */
export async function up(db: Kysely<any>): Promise<void> {
  await sql`create collation natural_order
    (provider = icu, locale = 'en-u-kn-true-ks-level2', deterministic = false)`.execute(db)

  // An instant with its offset reads the same in every session, so this is immutable where the plain cast is not. A year
  // that no timestamptz can hold is no reason to lose a run.
  await sql`create function run_started_at(facts jsonb) returns timestamptz(3)
    language plpgsql immutable parallel safe as $$
    begin
      return (facts ->> 'startedAt')::timestamptz(3);
    exception when data_exception then
      return null;
    end $$`.execute(db)
  await sql`alter table runs
    add column started_at timestamptz(3) generated always as (run_started_at(facts)) stored`.execute(db)

  await sql`create index runs_by_start on runs (project_id, started_at, id)`.execute(db)
  await sql`create index runs_by_latest_start on runs (project_id, started_at desc nulls last, id desc)`.execute(db)
  await sql`create index runs_by_name on runs (project_id, name collate natural_order, id)`.execute(db)
  await sql`create index analyses_by_name on analyses (project_id, name collate natural_order, id)`.execute(db)
}

export async function down(db: Kysely<any>): Promise<void> {
  await sql`drop index runs_by_start, runs_by_latest_start, runs_by_name, analyses_by_name`.execute(db)
  await sql`alter table runs drop column started_at`.execute(db)
  await sql`drop function run_started_at(jsonb)`.execute(db)
  await sql`drop collation natural_order`.execute(db)
}
