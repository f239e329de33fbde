import 'server-only'
import { z } from 'zod'
import { database } from '@/db'
import { accessProject, type ProjectAccess, type Right } from '@/db/queries/access'
import { requireUser, type SignedInUser } from './auth'
import { bodyParts } from './body'
import { AppError, errorResponse } from './errors'
import { assertOwnOrigin } from './origin'
import { plain } from './plain'
import { isStorable } from './storable'

/** What Next.js hands to a handler beside the request: the parts of its address. */
export interface RouteContext<Name extends string> {
  params: Promise<Record<Name, string>>
}

/** Runs a handler's work; whatever it throws becomes the one form of refusal. */
export async function respond(work: () => Promise<Response>): Promise<Response> {
  try {
    return await work()
  } catch (error) {
    return errorResponse(error)
  }
}

/** The same for everything that changes something: refused unless it comes from a page of ours. */
export function respondToMutation(request: Request, work: () => Promise<Response>): Promise<Response> {
  return respond(() => {
    assertOwnOrigin(request)
    return work()
  })
}

interface ProjectRequest<Name extends string, R extends Right> {
  request: Request
  context: RouteContext<Name | 'projectId'>
  right: R
}

interface ProjectCase<Name extends string, R extends Right> {
  access: ProjectAccess<R>
  user: SignedInUser
  params: Record<Name | 'projectId', string>
}

const READING = new Set(['GET', 'HEAD'])

/**
 * Settles, in this order, where a request comes from (if it changes anything), who asks (401), and whether that person
 * may (404 to strangers, 403 to members without the right); only then the case itself is looked at.
 */
export function respondInProject<Name extends string, R extends Right>(
  { request, context, right }: ProjectRequest<Name, R>,
  work: (projectCase: ProjectCase<Name, R>) => Promise<Response>,
): Promise<Response> {
  const answer = async () => {
    const user = await requireUser(request)
    const params = await context.params
    for (const id of Object.values<string>(params)) {
      if (!z.uuid().safeParse(id).success) throw new AppError('not-found', 'There is nothing at this address')
    }
    const access = await accessProject(database(), { userId: user.id, projectId: params.projectId, right })
    return work({ access, user, params })
  }
  return READING.has(request.method) ? respond(answer) : respondToMutation(request, answer)
}

/** Largest JSON body; a saved analysis is some 100 kB. */
const LARGEST_JSON_BYTES = 4 * 1024 * 1024

/** The body, parsed as JSON and by the schema. */
export async function readJson<Schema extends z.ZodType>(request: Request, schema: Schema): Promise<z.output<Schema>> {
  const parts: Uint8Array[] = []
  const limits = { mostBytes: LARGEST_JSON_BYTES, tooLargeMessage: 'This is more than can be saved at once (4 MB)' }
  for await (const part of bodyParts(request, limits)) parts.push(part)
  let value: unknown
  try {
    value = JSON.parse(Buffer.concat(parts).toString('utf8'))
  } catch {
    throw new AppError('bad-request', 'The request holds no readable JSON')
  }
  if (!isStorable(value)) {
    throw new AppError(
      'bad-request',
      'A text holds a character that can’t be kept (NUL, or half of a pair). Remove it.',
    )
  }
  return schema.parse(value)
}

/** Answers a value in the form that the schema promises; nothing that the schema does not name leaves the server. */
export function answer<Schema extends z.ZodType>(schema: Schema, value: unknown, status = 200): Response {
  return Response.json(plain(schema, value), { status, headers: { 'cache-control': 'no-store' } })
}

export function answerNothing(): Response {
  return new Response(null, { status: 204 })
}

/** What a list is asked for: the query of the address, parsed. */
export function queryOf<Schema extends z.ZodType>(request: Request, schema: Schema): z.output<Schema> {
  return schema.parse(Object.fromEntries(new URL(request.url).searchParams))
}
