import { sql, type Kysely } from 'kysely'

/**
 * Who changed and who settled a note where it was brought in from. A trigger drops the name as soon as somebody here does
 * the same again, because whoever edits a note knows nothing of where it comes from.
 */
export async function up(db: Kysely<any>): Promise<void> {
  await sql`alter table notes
    add column updated_by_name text check (length(updated_by_name) between 1 and 80),
    add column resolved_by_name text check (length(resolved_by_name) between 1 and 80)`.execute(db)
  await sql`create function drop_imported_note_names() returns trigger language plpgsql as $$
    begin
      if new.updated_at is distinct from old.updated_at then new.updated_by_name := null; end if;
      if new.resolved_at is distinct from old.resolved_at then new.resolved_by_name := null; end if;
      return new;
    end $$`.execute(db)
  await sql`create trigger notes_changed_here before update of updated_at, resolved_at on notes for each row
    execute function drop_imported_note_names()`.execute(db)
}

export async function down(db: Kysely<any>): Promise<void> {
  await sql`drop trigger notes_changed_here on notes`.execute(db)
  await sql`drop function drop_imported_note_names`.execute(db)
  await sql`alter table notes drop column updated_by_name, drop column resolved_by_name`.execute(db)
}
