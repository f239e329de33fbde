import type { Role } from '@/lib/schemas/api'

/** What a mail tells, as plain data; `token` is the one that its link carries. */
export type MailFacts =
  | { kind: 'sign-up'; token: string; expiresAt: Date }
  | { kind: 'sign-up-again'; displayName: string }
  | { kind: 'reset-password'; displayName: string; token: string; expiresAt: Date }
  | { kind: 'password-changed'; displayName: string }
  | { kind: 'change-email'; displayName: string; token: string; expiresAt: Date }
  | { kind: 'email-changed'; displayName: string }
  | { kind: 'account-deleted'; displayName: string }
  | InvitationFacts
  | MentionFacts

export interface InvitationFacts {
  kind: 'invitation'
  inviterName: string
  projectName: string
  role: Role
  token: string
  expiresAt: Date
}

export interface MentionFacts {
  kind: 'mention'
  displayName: string
  actorName: string
  projectId: string
  projectName: string
  analysisId: string
  analysisName: string
  noteText: string
}
