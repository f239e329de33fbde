import { sql } from 'kysely'
import { beforeEach, describe, expect, test } from 'vitest'
import { POST as accept } from '@/app/api/invitations/accept/route'
import { POST as signUpWithLink } from '@/app/api/invitations/sign-up/route'
import { GET as me } from '@/app/api/me/route'
import { GET as listAuditEvents } from '@/app/api/projects/[projectId]/audit-events/route'
import { DELETE as revoke } from '@/app/api/projects/[projectId]/invitations/[invitationId]/route'
import { POST as resend } from '@/app/api/projects/[projectId]/invitations/[invitationId]/resend/route'
import { GET as list, POST as invite } from '@/app/api/projects/[projectId]/invitations/route'
import type { Role } from '@/lib/schemas/api'
import type { Invitation } from '@/lib/schemas/people'
import { loadInvitationLink } from '@/lib/server/load-people'
import { openTestDatabase } from '../support/test-database'
import { insertPendingInvitation, newAddress, writeMail } from '../support/test-invitation'
import { makeProject, type TestProject } from '../support/test-project'
import { call, cookieOf, PASSWORD, signUpPerson, type Person } from '../support/test-server'

const database = openTestDatabase()
let project: TestProject

beforeEach(async () => {
  await database.db.deleteFrom('rateLimits').execute()
  await sql`delete from graphile_worker._private_jobs`.execute(database.db)
  project = await makeProject(database.db)
})

function post(email: string, role: Role = 'viewer', cookie = project.people.owner.cookie) {
  return call(invite, '/', { projectId: project.id }, { method: 'POST', body: { email, role }, cookie })
}

async function invited(email: string, role: Role = 'viewer'): Promise<Invitation> {
  const response = await post(email, role)
  expect(response.status).toBe(201)
  return response.json()
}

const change = (handler: unknown, method: string, invitationId: string) =>
  call(handler, '/', { projectId: project.id, invitationId }, { method, cookie: project.people.owner.cookie })
const sendAgain = (id: string) => change(resend, 'POST', id)
const takeBack = (id: string) => change(revoke, 'DELETE', id)
const join = (token: string, { cookie }: Pick<Person, 'cookie'>) =>
  call(accept, '/', {}, { method: 'POST', body: { token }, cookie })
const signUp = (token: string, displayName = 'Nora Newcomer') =>
  call(signUpWithLink, '/', {}, { method: 'POST', body: { token, displayName, password: PASSWORD } })

async function pending(): Promise<Invitation[]> {
  const response = await call(list, '/', { projectId: project.id }, project.people.owner)
  return (await response.json()).invitations
}

async function roleOf({ id }: { id: string }): Promise<Role | null> {
  const row = await database.db
    .selectFrom('memberships')
    .select('role')
    .where('projectId', '=', project.id)
    .where('userId', '=', id)
    .executeTakeFirst()
  return row?.role ?? null
}

async function refusal(response: Response) {
  const { code, message } = (await response.json()).error
  return { status: response.status, code, message }
}

async function expire(id: string): Promise<void> {
  await database.db
    .updateTable('invitations')
    .set({ expiresAt: new Date(Date.now() - 1000) })
    .where('id', '=', id)
    .execute()
}

async function archive(): Promise<void> {
  await database.db
    .updateTable('projects')
    .set({ archivedAt: new Date(), archivedBy: project.people.owner.id })
    .where('id', '=', project.id)
    .execute()
}

async function queuedMails(): Promise<unknown[]> {
  const { rows } = await sql<{ payload: unknown }>`select payload from graphile_worker._private_jobs`.execute(
    database.db,
  )
  return rows.map(({ payload }) => payload)
}

async function lastEvent() {
  const { cookie } = project.people.owner
  const response = await call(listAuditEvents, '/', { projectId: project.id }, { cookie })
  return (await response.json()).events[0]
}

describe('inviting', () => {
  test('puts a mail into the queue, for two weeks, and tells the history no address', async () => {
    const email = newAddress()
    const invitation = await invited(email, 'editor')
    expect(invitation).toMatchObject({ email, role: 'editor', invitedBy: 'Olga Owner', mail: 'on-its-way' })
    expect(Date.parse(invitation.expiresAt) - Date.parse(invitation.createdAt)).toBe(14 * 24 * 3600 * 1000)
    expect(await queuedMails()).toEqual([{ kind: 'invitation', invitationId: invitation.id }])
    expect(await pending()).toEqual([invitation])
    const event = await lastEvent()
    expect(event).toMatchObject({ action: 'invitation.create', subject: 'as an editor' })
    expect(JSON.stringify(event)).not.toContain(email)
  })

  test('a member is refused, in whatever case the address is typed', async () => {
    const { editor } = project.people
    const refused = await refusal(await post(editor.email.toUpperCase()))
    expect(refused).toMatchObject({ status: 409, code: 'already-member' })
    expect(refused.message).toContain('Edda Editor')
    expect(await queuedMails()).toEqual([])
  })

  test('oneself is refused', async () => {
    const refused = await refusal(await post(project.people.owner.email))
    expect(refused).toMatchObject({ status: 409, code: 'already-member' })
    expect(refused.message).toContain('your own address')
  })

  test('an address that was invited already is refused with the invitation that waits, in whatever case', async () => {
    const email = newAddress()
    const first = await invited(email)
    const response = await post(email.toUpperCase(), 'editor')
    expect(response.status).toBe(409)
    expect((await response.json()).error).toMatchObject({ code: 'already-invited', current: first })
    expect(await pending()).toEqual([first])
  })

  test('an address with and one without an account get the same answer', async () => {
    const withAccount = await invited(project.people.stranger.email)
    const without = await invited(newAddress())
    const alike = (invitation: Invitation) => ({ ...invitation, id: '', email: '', createdAt: '', expiresAt: '' })
    expect(alike(withAccount)).toEqual(alike(without))
  })

  test('two at once for one address: one invitation, one mail', async () => {
    const email = newAddress()
    const responses = await Promise.all([post(email), post(email), post(email)])
    expect(responses.map(({ status }) => status).sort()).toEqual([201, 409, 409])
    expect(await queuedMails()).toHaveLength(1)
  })

  test('an expired invitation does not stand in the way of a new one, and its link does not come back to life', async () => {
    const old = await insertPendingInvitation(database.db, project, { role: 'viewer' })
    await expire(old.id)
    expect(await pending()).toMatchObject([{ id: old.id, isExpired: true }])
    expect(await invited(old.email, 'editor')).toMatchObject({ role: 'editor', isExpired: false, mail: 'on-its-way' })
    expect(await pending()).toHaveLength(1)
    expect((await loadInvitationLink(old.token, null)).end).toBe('replaced')
  })

  test('nobody is invited into an archived project', async () => {
    const { id } = await insertPendingInvitation(database.db, project)
    await archive()
    expect(await refusal(await post(newAddress()))).toMatchObject({ status: 409, code: 'archived' })
    expect(await refusal(await sendAgain(id))).toMatchObject({ status: 409, code: 'archived' })
    expect((await takeBack(id)).status).toBe(204)
  })

  test.each([
    ['no address', { email: 'nobody', role: 'viewer' }, 'email'],
    ['no role of ours', { email: 'a@example.org', role: 'admin' }, 'role'],
  ])('%s is refused beside its field', async (_, body, field) => {
    const { cookie } = project.people.owner
    const response = await call(invite, '/', { projectId: project.id }, { method: 'POST', body, cookie })
    expect(response.status).toBe(422)
    expect(Object.keys((await response.json()).error.fields)).toEqual([field])
  })

  test('the forty-first within an hour is put off', async () => {
    const statuses: number[] = []
    for (let count = 1; count <= 41; count += 1) statuses.push((await post(newAddress())).status)
    expect(statuses).toEqual([...Array(40).fill(201), 429])
  })
})

describe('the mail', () => {
  test('its state: on its way, failing, sent, and on its way again after sending again', async () => {
    const { id } = await invited(newAddress())
    const set = (values: { sendFault: string | null; sentAt: Date | null }) =>
      database.db.updateTable('invitations').set(values).where('id', '=', id).execute()
    const mailFault = 'The mail server can’t be reached. The mail is sent by itself once it can.'
    await set({ sendFault: mailFault, sentAt: null })
    expect(await pending()).toMatchObject([{ mail: 'failing', mailFault }])
    const sentAt = new Date('2026-11-30T20:00:00.000Z')
    await set({ sendFault: null, sentAt })
    expect(await pending()).toMatchObject([{ mail: 'sent', sentAt: sentAt.toISOString() }])
    expect(await (await sendAgain(id)).json()).toMatchObject({
      mail: 'on-its-way',
      sentAt: null,
      mailFault: null,
    })
  })

  test('sending again while the first mail still waits leaves one mail in the queue', async () => {
    const { id } = await invited(newAddress())
    for (let count = 1; count <= 3; count += 1) expect((await sendAgain(id)).status).toBe(200)
    expect(await queuedMails()).toEqual([{ kind: 'invitation', invitationId: id }])
  })

  test('sending again gives two weeks from now, and the old link ends when the new mail is written', async () => {
    const first = await insertPendingInvitation(database.db, project)
    await expire(first.id)
    const response = await sendAgain(first.id)
    expect(response.status).toBe(200)
    const { expiresAt, isExpired } = await response.json()
    expect(isExpired).toBe(false)
    const days = (Date.parse(expiresAt) - Date.now()) / (24 * 3600 * 1000)
    expect(days).toBeGreaterThan(13.9)
    expect(days).toBeLessThanOrEqual(14)
    expect((await loadInvitationLink(first.token, null)).end).toBeNull()
    const newToken = await writeMail(database.db, first.id)
    expect((await loadInvitationLink(first.token, null)).end).toBe('replaced')
    const { stranger } = project.people
    expect(await refusal(await join(first.token, stranger))).toMatchObject({ status: 410, code: 'link-ended' })
    expect((await join(newToken, stranger)).status).toBe(200)
    expect((await loadInvitationLink(first.token, null)).end).toBe('used')
  })

  test('what was accepted or taken back can be neither sent nor taken back again', async () => {
    const used = await insertPendingInvitation(database.db, project)
    expect((await join(used.token, project.people.stranger)).status).toBe(200)
    const revoked = await insertPendingInvitation(database.db, project)
    expect((await takeBack(revoked.id)).status).toBe(204)
    for (const { id } of [used, revoked]) {
      expect((await sendAgain(id)).status).toBe(404)
      expect((await takeBack(id)).status).toBe(404)
    }
    expect(await pending()).toEqual([])
  })
})

describe('the link', () => {
  test('lets somebody with an account join, once', async () => {
    const { stranger } = project.people
    const { token } = await insertPendingInvitation(database.db, project, { email: stranger.email, role: 'editor' })
    const response = await join(token, stranger)
    expect(response.status).toBe(200)
    expect(await response.json()).toEqual({ projectId: project.id, role: 'editor' })
    expect(await roleOf(stranger)).toBe('editor')
    expect(await lastEvent()).toMatchObject({
      actorName: 'Stina Stranger',
      action: 'member.join',
      subject: 'as an editor, invited by Olga Owner',
    })
    const other = await signUpPerson('Otto Other')
    expect(await refusal(await join(token, other))).toMatchObject({ status: 410, code: 'link-ended' })
    expect(await roleOf(other)).toBeNull()
  })

  test('lets its holder join with another address', async () => {
    const { token } = await insertPendingInvitation(database.db, project)
    expect((await join(token, project.people.stranger)).status).toBe(200)
    expect(await roleOf(project.people.stranger)).toBe('viewer')
  })

  test('asks for a session', async () => {
    const { token } = await insertPendingInvitation(database.db, project)
    const response = await call(accept, '/', {}, { method: 'POST', body: { token } })
    expect(response.status).toBe(401)
  })

  test('makes an account for the invited address, with a session, and joins', async () => {
    const { token, email } = await insertPendingInvitation(database.db, project, { role: 'editor' })
    const response = await signUp(token)
    expect(response.status).toBe(201)
    const { user } = await (await call(me, '/', {}, { cookie: cookieOf(response) })).json()
    expect(user).toMatchObject({ displayName: 'Nora Newcomer', email })
    expect(await roleOf(user)).toBe('editor')
    expect(await lastEvent()).toMatchObject({ actorName: 'Nora Newcomer', action: 'member.join' })
  })

  test('makes no second account for an address that has one in another case, and stays open', async () => {
    const { stranger } = project.people
    const { token } = await insertPendingInvitation(database.db, project, { email: stranger.email.toUpperCase() })
    expect((await loadInvitationLink(token, null)).invitation?.hasAccount).toBe(true)
    const response = await signUp(token)
    expect(response.headers.get('set-cookie')).toBeNull()
    expect(await refusal(response)).toMatchObject({ status: 409, code: 'in-use' })
    expect((await join(token, stranger)).status).toBe(200)
  })

  test.each([
    ['no name', { displayName: ' ' }, 'displayName'],
    ['a short password', { password: '123456789' }, 'password'],
  ])('signing up with %s is refused beside that field and uses nothing up', async (_, fault, field) => {
    const { token } = await insertPendingInvitation(database.db, project)
    const body = { token, displayName: 'Nora', password: PASSWORD, ...fault }
    const response = await call(signUpWithLink, '/', {}, { method: 'POST', body })
    expect(response.status).toBe(422)
    expect(Object.keys((await response.json()).error.fields)).toEqual([field])
    expect((await loadInvitationLink(token, null)).end).toBeNull()
  })

  test('looking at it changes nothing', async () => {
    const { id, token } = await insertPendingInvitation(database.db, project)
    const row = () => database.db.selectFrom('invitations').selectAll().where('id', '=', id).executeTakeFirstOrThrow()
    const before = await row()
    for (const userId of [null, project.people.stranger.id]) {
      const link = await loadInvitationLink(token, userId)
      expect(link).toMatchObject({ end: null, memberRole: null, invitation: { projectName: 'Test mount' } })
    }
    expect(await row()).toEqual(before)
    expect(await roleOf(project.people.stranger)).toBeNull()
  })
})

describe('members who follow a link', () => {
  test.each([
    ['editor', 'viewer'],
    ['editor', 'editor'],
    ['owner', 'viewer'],
  ] as const)('an invitation never lowers a role: %s, invited as %s', async (own, role) => {
    const member = project.people[own]
    const { token } = await insertPendingInvitation(database.db, project, { role })
    expect(await refusal(await join(token, member))).toMatchObject({ status: 409, code: 'already-member' })
    expect(await roleOf(member)).toBe(own)
    // It stays for the person whom it was meant for.
    expect((await join(token, project.people.stranger)).status).toBe(200)
  })

  test('a higher role is given, and the history says so', async () => {
    const { viewer } = project.people
    const { token } = await insertPendingInvitation(database.db, project, { role: 'editor' })
    expect((await loadInvitationLink(token, viewer.id)).memberRole).toBe('viewer')
    expect((await join(token, viewer)).status).toBe(200)
    expect(await roleOf(viewer)).toBe('editor')
    expect(await lastEvent()).toMatchObject({ action: 'member.raise', subject: 'as an editor, invited by Olga Owner' })
  })
})

describe('a link that opens nothing says why', () => {
  test.each([
    ['expired', 'expired', 410, ({ id }: { id: string }) => expire(id)],
    ['revoked', 'taken back', 410, ({ id }: { id: string }) => takeBack(id)],
    ['replaced', 'newer mail', 410, ({ id }: { id: string }) => writeMail(database.db, id)],
    ['archived', 'archived', 409, () => archive()],
    ['deleted', 'deleted', 410, () => database.db.deleteFrom('projects').where('id', '=', project.id).execute()],
  ] as const)('%s', async (end, word, status, spoil) => {
    const invitation = await insertPendingInvitation(database.db, project)
    await spoil(invitation)
    expect((await loadInvitationLink(invitation.token, null)).end).toBe(end)
    for (const response of [await join(invitation.token, project.people.stranger), await signUp(invitation.token)]) {
      const refused = await refusal(response)
      expect(refused.status).toBe(status)
      expect(refused.message).toContain(word)
      expect(refused.message).not.toContain(invitation.token)
    }
    const account = await database.db
      .selectFrom('users')
      .select('id')
      .where('email', '=', invitation.email)
      .executeTakeFirst()
    expect(account).toBeUndefined()
    expect(await roleOf(project.people.stranger)).toBeNull()
  })

  test('a token that never was, and the stored hash itself', async () => {
    const { id } = await insertPendingInvitation(database.db, project)
    const { tokenSha256 } = await database.db
      .selectFrom('invitations')
      .select('tokenSha256')
      .where('id', '=', id)
      .executeTakeFirstOrThrow()
    for (const token of ['nothing', tokenSha256 ?? '']) {
      const refused = await refusal(await join(token, project.people.stranger))
      expect(refused).toMatchObject({ status: 404, code: 'not-found' })
    }
  })
})

describe('at once', () => {
  /** Several rounds, since requests at once do not meet each time. */
  const ROUNDS = [1, 2, 3]

  test.each(ROUNDS)('three people with one link: one joins (round %i)', async () => {
    const people = [await signUpPerson('Ann One'), await signUpPerson('Ben Two'), await signUpPerson('Cid Three')]
    const { token } = await insertPendingInvitation(database.db, project)
    const responses = await Promise.all(people.map((person) => join(token, person)))
    expect(responses.map(({ status }) => status).sort()).toEqual([200, 410, 410])
    const roles = await Promise.all(people.map(roleOf))
    expect(roles.filter((role) => role !== null)).toHaveLength(1)
  })

  test.each(ROUNDS)('two sign-ups with one link: one account, one member (round %i)', async () => {
    const { token, email } = await insertPendingInvitation(database.db, project)
    const responses = await Promise.all([signUp(token, 'First'), signUp(token, 'Second')])
    expect(responses.map(({ status }) => status).sort()).toEqual([201, 410])
    const accounts = await database.db.selectFrom('users').select('id').where('email', '=', email).execute()
    expect(accounts).toHaveLength(1)
    expect(await roleOf(accounts[0])).toBe('viewer')
  })

  test.each(ROUNDS)('joining while it is taken back: one of both happens (round %i)', async () => {
    const person = await signUpPerson('Quick Quinn')
    const { id, token } = await insertPendingInvitation(database.db, project)
    const [joined, revoked] = await Promise.all([join(token, person), takeBack(id)])
    expect([
      [200, 404],
      [410, 204],
    ]).toContainEqual([joined.status, revoked.status])
    expect(await roleOf(person)).toBe(joined.status === 200 ? 'viewer' : null)
  })
})

test('guessing tokens is put off, following a good link is not counted', async () => {
  const { stranger } = project.people
  process.env.TRUST_PROXY = '1'
  try {
    const guess = () =>
      call(
        accept,
        '/',
        {},
        {
          method: 'POST',
          body: { token: 'guess' },
          cookie: stranger.cookie,
          headers: { 'x-forwarded-for': '203.0.113.9' },
        },
      )
    const statuses: number[] = []
    for (let count = 1; count <= 31; count += 1) statuses.push((await guess()).status)
    expect(statuses).toEqual([...Array(30).fill(404), 429])
  } finally {
    delete process.env.TRUST_PROXY
  }
  const { token } = await insertPendingInvitation(database.db, project)
  expect((await join(token, stranger)).status).toBe(200)
  const left = await database.db
    .selectFrom('rateLimits')
    .select('key')
    .where('key', 'like', '%link address shared')
    .execute()
  expect(left).toEqual([])
})
