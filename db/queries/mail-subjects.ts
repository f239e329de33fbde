import { sql, type Kysely } from 'kysely'
import type { Database } from '../schema'

/*
 * What a mail tells of, read at the moment when it is written. Each answers undefined when there is nothing to write any
 * more: gone, used, revoked or run out.
 */

export function findSignUpForMail(db: Kysely<Database>, signUpId: string) {
  return db
    .selectFrom('signUps')
    .select(['email', 'expiresAt'])
    .where('id', '=', signUpId)
    .where('expiresAt', '>', sql<Date>`now()`)
    .executeTakeFirst()
}

function people(db: Kysely<Database>) {
  return db
    .selectFrom('users')
    .select(['id', 'displayName', sql<string>`email`.as('email')])
    .where('email', 'is not', null)
}

export function findPersonForMail(db: Kysely<Database>, userId: string) {
  return people(db).where('id', '=', userId).executeTakeFirst()
}

export function findPersonByAddress(db: Kysely<Database>, email: string) {
  return people(db)
    .where(sql<string>`lower(email)`, '=', email.toLowerCase())
    .executeTakeFirst()
}

/** Also of an account that has been deleted since. */
export function findNameForMail(db: Kysely<Database>, userId: string) {
  return db.selectFrom('users').select('displayName').where('id', '=', userId).executeTakeFirst()
}

function openInvitations(db: Kysely<Database>, invitationId: string) {
  return db
    .selectFrom('invitations')
    .where('invitations.id', '=', invitationId)
    .where('acceptedAt', 'is', null)
    .where('revokedAt', 'is', null)
    .where('invitations.expiresAt', '>', sql<Date>`now()`)
}

export function findInvitationForMail(db: Kysely<Database>, invitationId: string) {
  return openInvitations(db, invitationId)
    .innerJoin('projects', 'projects.id', 'invitations.projectId')
    .innerJoin('users as inviters', 'inviters.id', 'invitations.invitedBy')
    .select([
      'invitations.email',
      'invitations.role',
      'invitations.expiresAt',
      'projects.name as projectName',
      'inviters.displayName as inviterName',
    ])
    .executeTakeFirst()
}

/** Only while the note names this person, and both they and whoever named them are members. */
export function findMentionForMail(
  db: Kysely<Database>,
  { noteId, userId, actorId }: { noteId: string; userId: string; actorId: string },
) {
  return db
    .selectFrom('noteMentions')
    .innerJoin('notes', 'notes.id', 'noteMentions.noteId')
    .innerJoin('analyses', 'analyses.id', 'notes.analysisId')
    .innerJoin('projects', 'projects.id', 'analyses.projectId')
    .innerJoin('memberships', (join) =>
      join.onRef('memberships.projectId', '=', 'projects.id').onRef('memberships.userId', '=', 'noteMentions.userId'),
    )
    .innerJoin('users', 'users.id', 'noteMentions.userId')
    .innerJoin('users as actors', (join) => join.on('actors.id', '=', actorId))
    .innerJoin('memberships as actorMemberships', (join) =>
      join.onRef('actorMemberships.projectId', '=', 'projects.id').onRef('actorMemberships.userId', '=', 'actors.id'),
    )
    .where('noteMentions.noteId', '=', noteId)
    .where('noteMentions.userId', '=', userId)
    .where('users.email', 'is not', null)
    .select([
      sql<string>`users.email`.as('email'),
      'users.displayName',
      'actors.displayName as actorName',
      'projects.id as projectId',
      'projects.name as projectName',
      'analyses.id as analysisId',
      'analyses.name as analysisName',
      'notes.text as noteText',
    ])
    .executeTakeFirst()
}
