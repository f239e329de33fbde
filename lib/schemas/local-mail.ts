import { z } from 'zod'

/*
 * What the start script's own mail server keeps, for the page /local-mail and for tests. All of it answers 404 where mail
 * really goes out.
 */

const localMailRowSchema = z.object({
  /** Of the file that it lies in; a later one sorts after. */
  name: z.string(),
  to: z.string(),
  subject: z.string(),
  at: z.iso.datetime(),
})
export type LocalMailRow = z.infer<typeof localMailRowSchema>

/** GET /api/local-mail → 200, newest first. DELETE → 204: all are deleted. */
export const localMailListSchema = z.object({ isRefusing: z.boolean(), mails: z.array(localMailRowSchema) })

/** GET /api/local-mail/[mailName] → 200. Its HTML part alone, as a page: /api/local-mail/[mailName]/html. */
export const localMailSchema = localMailRowSchema.extend({
  from: z.string(),
  text: z.string(),
  hasHtml: z.boolean(),
  /** The addresses in its text, in their order, each once. */
  links: z.array(z.string()),
})
export type LocalMail = z.infer<typeof localMailSchema>

/** PUT /api/local-mail/refusing → 200 with the same: whether the server turns every mail away, as one that is down does. */
export const localMailRefusingSchema = z.object({ isRefusing: z.boolean() })
