import { z } from 'zod'
import { signUpSchema } from './api'

const id = z.uuid()
const instant = z.iso.datetime()
const email = signUpSchema.shape.email
const newPassword = signUpSchema.shape.password
const presentPassword = z.string().min(1, { error: 'Type your password' }).max(200)
/** Of a link in a mail. */
const token = z.string().min(1).max(200)

// Signing up, and links in mails ----------------------------------------------------------------------------------------

/** What is answered whether or not an address has an account: nothing may tell them apart. */
export const mailOnItsWaySchema = z.object({ status: z.literal('mail-on-its-way') })
export const MAIL_ON_ITS_WAY = { status: 'mail-on-its-way' } as const

/** POST /api/auth/sign-up → 202 mailOnItsWaySchema, always. `next`: where to go on once there is an account. */
export const signUpRequestSchema = signUpSchema.extend({ next: z.string().optional() })

/**
 * POST /api/auth/verify-email → 200 verifiedSchema; 410 `link-ended`, 409 `in-use` once the address has an account, 422 with
 * fields.password where another browser than the one that signed up must give the password that was chosen there.
 */
export const verifyEmailSchema = z.object({ token, password: z.string().max(200).optional() })
export const verifiedSchema = z.discriminatedUnion('outcome', [
  /** A session is open. */
  z.object({ outcome: z.literal('account-made'), next: z.string().nullable() }),
  z.object({ outcome: z.literal('address-changed'), email: z.string() }),
])

/** POST /api/auth/reset-password/ask → 202 mailOnItsWaySchema, always. */
export const askResetSchema = z.object({ email })
/** POST /api/auth/reset-password → 204 with a session of its own, the only one; 410 `link-ended`. */
export const resetPasswordSchema = z.object({ token, password: newPassword })

// The account itself (signed in) ----------------------------------------------------------------------------------------

/** PATCH /api/account → 200 meSchema. */
export const nameChangeSchema = signUpSchema.pick({ displayName: true })
/** POST /api/account/email → 202 mailOnItsWaySchema whether or not the address is free; 422 with fields.password. */
export const emailChangeSchema = z.object({ email, password: presentPassword })
/** POST /api/account/password → 204 and the end of all other sessions; 422 with fields.password. */
export const passwordChangeSchema = z.object({ password: presentPassword, newPassword })

/** GET /api/account/sessions; DELETE ends all others; DELETE /api/account/sessions/[sessionId] ends one. */
export const sessionSchema = z.object({
  id,
  /** In words: “Firefox on Linux”. */
  device: z.string(),
  createdAt: instant,
  lastSeenAt: instant,
  /** The one that asks. */
  isThis: z.boolean(),
})
export type AccountSession = z.infer<typeof sessionSchema>
export const sessionListSchema = z.object({ sessions: z.array(sessionSchema) })

const namedProject = z.object({ id, name: z.string() })
/** GET /api/account/deletion: what DELETE /api/account would do. */
export const deletionSchema = z.object({
  /** Others are members, but nobody else is owner: in the way. */
  blocking: z.array(namedProject),
  /** Nobody else is a member: deleted with everything in them. */
  lost: z.array(
    namedProject.extend({
      runCount: z.number().int(),
      analysisCount: z.number().int(),
      correctionCount: z.number().int(),
    }),
  ),
  /** They go on without this person. */
  left: z.array(namedProject),
})
export type Deletion = z.infer<typeof deletionSchema>
/** DELETE /api/account → 204; 409 `last-owner`, 422 with fields.email or fields.password. */
export const deleteAccountSchema = z.object({ email: z.string().max(254), password: presentPassword })
