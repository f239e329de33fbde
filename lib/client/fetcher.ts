import type { z } from 'zod'
import { errorAnswerSchema } from '@/lib/schemas/api'

interface Refusal {
  status: number
  code: string
  fields?: Record<string, string>
  changedBy?: string
  changedAt?: string
  current?: unknown
}

/** A request that the server refused, or that never reached it. The message can be shown as it is. */
export class RequestError extends Error {
  readonly status: number
  readonly code: string
  /** Field name to what is wrong with it. */
  readonly fields: Record<string, string>
  readonly changedBy?: string
  readonly changedAt?: string
  readonly current?: unknown

  constructor(message: string, refusal: Refusal) {
    super(message)
    this.name = 'RequestError'
    this.status = refusal.status
    this.code = refusal.code
    this.fields = refusal.fields ?? {}
    this.changedBy = refusal.changedBy
    this.changedAt = refusal.changedAt
    this.current = refusal.current
  }

  /** The session has ended, or there was none. */
  get isSignedOut(): boolean {
    return this.code === 'not-signed-in'
  }

  /** Somebody else changed the same thing after this person had opened it. */
  get isConflict(): boolean {
    return this.code === 'changed-meanwhile'
  }
}

/** Reads an address and checks the answer; the fetcher of every SWR hook. */
export function getJson<Schema extends z.ZodType>(url: string, schema: Schema): Promise<z.output<Schema>> {
  return ask(url, { method: 'GET' }, schema)
}

/** Sends a body as JSON and checks the answer. */
export function sendJson<Schema extends z.ZodType>(
  method: 'POST' | 'PUT' | 'PATCH' | 'DELETE',
  url: string,
  body: unknown,
  schema: Schema,
): Promise<z.output<Schema>> {
  const init = { method, headers: { 'content-type': 'application/json' }, body: JSON.stringify(body) }
  return ask(url, init, schema)
}

/** Sends a file's bytes as they are and checks the answer. */
export function sendBytes<Schema extends z.ZodType>(
  url: string,
  bytes: Uint8Array<ArrayBuffer> | Blob,
  schema: Schema,
): Promise<z.output<Schema>> {
  return ask(url, { method: 'POST', headers: { 'content-type': 'application/octet-stream' }, body: bytes }, schema)
}

/** For requests that answer nothing (204), with a body as JSON or without one. */
export async function sendOnly(method: 'POST' | 'DELETE', url: string, body?: unknown): Promise<void> {
  const json = { headers: { 'content-type': 'application/json' }, body: JSON.stringify(body) }
  const response = await reach(url, { method, ...(body === undefined ? {} : json) })
  if (!response.ok) throw await refusal(response)
}

async function ask<Schema extends z.ZodType>(
  url: string,
  init: RequestInit,
  schema: Schema,
): Promise<z.output<Schema>> {
  const response = await reach(url, init)
  if (!response.ok) throw await refusal(response)
  const parsed = schema.safeParse(await response.json().catch(() => undefined))
  if (parsed.success) return parsed.data
  throw new RequestError('The server’s answer could not be read. Reload the page and try again.', {
    status: response.status,
    code: 'unreadable-answer',
  })
}

async function reach(url: string, init: RequestInit): Promise<Response> {
  try {
    return await fetch(url, { ...init, headers: { accept: 'application/json', ...init.headers } })
  } catch {
    throw new RequestError('The server can’t be reached. What you typed is still here; try again in a moment.', {
      status: 0,
      code: 'unreachable',
    })
  }
}

type RefusalListener = (refused: { url: string; status: number }) => void
const listeners = new Set<RefusalListener>()

/** Tells of every refusal, whichever part of a page asked. @returns what ends the telling */
export function onRefused(listener: RefusalListener): () => void {
  listeners.add(listener)
  return () => listeners.delete(listener)
}

/** What the answer of a refused request says. */
export async function refusal(response: Response): Promise<RequestError> {
  for (const listener of listeners) listener({ url: response.url, status: response.status })
  const parsed = errorAnswerSchema.safeParse(await response.json().catch(() => undefined))
  if (parsed.success) {
    const { message, ...rest } = parsed.data.error
    return new RequestError(message, { status: response.status, ...rest })
  }
  const message = 'The server could not do this. Nothing was changed; try again in a moment.'
  return new RequestError(message, { status: response.status, code: 'unknown' })
}
