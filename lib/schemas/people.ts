import { z } from 'zod'
import { LINK_ENDS } from '@/lib/findings/invitation-words'
import { roleSchema, signUpSchema } from './api'

const id = z.uuid()
const instant = z.iso.datetime()

// Invitations below a project (owner) -----------------------------------------------------------------------------------

/**
 * GET, POST /api/projects/[projectId]/invitations, DELETE …/invitations/[invitationId], POST …/[invitationId]/resend. POST
 * answers 409 `already-member`, or 409 `already-invited` with the invitation that waits in `current`.
 */
export const newInvitationSchema = z.object({ email: signUpSchema.shape.email, role: roleSchema })
export const invitationSchema = z.object({
  id,
  email: z.string(),
  role: roleSchema,
  invitedBy: z.string(),
  createdAt: instant,
  expiresAt: instant,
  isExpired: z.boolean(),
  mail: z.enum(['on-its-way', 'failing', 'sent']),
  sentAt: instant.nullable(),
  /** Why it has not gone out yet and what comes of it, in words. */
  mailFault: z.string().nullable(),
})
export type Invitation = z.infer<typeof invitationSchema>
/** Those that wait for an answer, expired ones among them, the newest first. */
export const invitationListSchema = z.object({ invitations: z.array(invitationSchema) })

// The link in the mail --------------------------------------------------------------------------------------------------

const token = z.string().min(1).max(200)
/** POST /api/invitations/accept → 200 joinedSchema; 410 `link-ended`, 409 `already-member`. */
export const acceptInvitationSchema = z.object({ token })
/** POST /api/invitations/sign-up → 201 joinedSchema and a session; 409 `in-use` once the address has an account. */
export const invitationSignUpSchema = signUpSchema.pick({ displayName: true, password: true }).extend({ token })
export const joinedSchema = z.object({ projectId: id, role: roleSchema })

/** What the page /invite/[token] tells; no handler gives it. */
export const invitationLinkSchema = z.object({
  /** Why it opens nothing; null: it can be followed. */
  end: z.enum(LINK_ENDS).nullable(),
  /** Null where it, or its project, is gone. */
  invitation: z
    .object({
      projectId: id,
      projectName: z.string(),
      email: z.string(),
      role: roleSchema,
      invitedBy: z.string(),
      expiresAt: instant,
      /** Whether the invited address can sign in. */
      hasAccount: z.boolean(),
    })
    .nullable(),
  /** What the visitor is in the project already. */
  memberRole: roleSchema.nullable(),
})
export type InvitationLink = z.infer<typeof invitationLinkSchema>
export type OpenInvitation = NonNullable<InvitationLink['invitation']>

// Members ---------------------------------------------------------------------------------------------------------------

/**
 * PATCH /api/projects/[projectId]/members/[userId] (owner) → 200 membershipSchema; DELETE (owner, or oneself) → 204.
 * `from` is the role that the asker saw: 409 `changed-meanwhile` where it is another by now. 409 `last-owner`.
 */
export const roleChangeSchema = z.object({ from: roleSchema, role: roleSchema })
export const membershipSchema = z.object({ userId: id, displayName: z.string(), role: roleSchema, joinedAt: instant })
