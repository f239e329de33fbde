import 'server-only'
import type { z } from 'zod'

/** What is kept has another form than its readers are promised: a fault of ours, never of what was asked. */
export class UnreadableError extends Error {}

/**
 * A value as its readers get it: dates as ISO 8601 text, and only what the schema names. Handlers and pages share this,
 * so that both show the same thing.
 *
 * @throws {UnreadableError} where the value has not that form
 */
export function plain<Schema extends z.ZodType>(schema: Schema, value: unknown): z.output<Schema> {
  const parsed = schema.safeParse(JSON.parse(JSON.stringify(value)))
  if (parsed.success) return parsed.data
  throw new UnreadableError('What is kept has not the form that is promised', { cause: parsed.error })
}

/** For what a page can do without: nothing where it is unreadable, with a line in the log. */
export async function unlessUnreadable<T>(pending: Promise<T>): Promise<T | undefined> {
  try {
    return await pending
  } catch (error) {
    if (!(error instanceof UnreadableError)) throw error
    console.error(error)
    return undefined
  }
}
