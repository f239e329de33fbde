import 'server-only'
import type { z } from 'zod'

/**
 * A value as its readers get it: dates as ISO 8601 text, and only what the schema names. Handlers and pages share this,
 * so that both show the same thing.
 */
export function plain<Schema extends z.ZodType>(schema: Schema, value: unknown): z.output<Schema> {
  return schema.parse(JSON.parse(JSON.stringify(value)))
}
