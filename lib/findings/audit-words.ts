import { capitalised } from './words'

/** Every action that the log may tell of, in words that stand between the person and the thing’s name. */
export const AUDIT_WORDS = {
  'project.create': 'made the project',
  'project.rename': 'renamed the project',
  'project.archive': 'archived the project',
  'project.reopen': 'opened the project again',
  'project.import': 'brought in the project',
  'project.delete': 'deleted the project',
  'drive-train.change': 'changed the drive train of',
  'invitation.create': 'invited somebody',
  'invitation.resend': 'sent an invitation again',
  'invitation.revoke': 'took back an invitation',
  'member.join': 'joined the project',
  'member.change': 'changed the role of',
  'member.raise': 'took a higher role',
  'member.remove': 'removed',
  'member.leave': 'left the project',
  'run.upload': 'brought in the run',
  'run.import': 'read the file of the run',
  'run.change': 'changed the run',
  'run.delete': 'deleted the run',
  'analysis.save': 'saved the analysis',
  'analysis.rename': 'renamed the analysis',
  'analysis.delete': 'deleted the analysis',
  'note.write': 'wrote the note',
  'note.change': 'changed the note',
  'note.resolve': 'settled the note',
  'note.reopen': 'took up again the note',
  'note.delete': 'deleted the note',
  'correction.create': 'made the correction table',
  'correction.delete': 'deleted the correction table',
  'optics-preset.create': 'kept the optics',
  'optics-preset.change': 'changed the optics',
  'optics-preset.delete': 'deleted the optics',
  'share-link.create': 'made a link that shows the analysis',
  'share-link.change': 'changed the link that shows the analysis',
  'share-link.revoke': 'ended the link that shows the analysis',
  'account.sign-up': 'made the account',
  'account.preferences': 'chose how to see things',
  'account.sign-in': 'signed in as',
  'account.rename': 'took the name',
  'account.change-email': 'changed the address to',
  'account.change-password': 'changed the password of',
  'account.reset-password': 'set a new password by mail for',
} as const satisfies Record<`${string}.${string}`, string>

export type AuditAction = keyof typeof AUDIT_WORDS

const isKnown = (action: string): action is AuditAction => Object.hasOwn(AUDIT_WORDS, action)

/** What was done, in words; an action from another version stands as it is written. */
export function auditWords(action: string): string {
  return isKnown(action) ? AUDIT_WORDS[action] : action.replace('.', ': ').replaceAll('-', ' ')
}

const THINGS: Record<string, string> = {
  correction: 'correction tables',
  analysis: 'analyses',
  'optics-preset': 'optics',
  account: 'accounts',
  member: 'people',
  project: 'the project',
  'drive-train': 'the drive train',
}

/** The kinds of things that a project’s log may speak of, to choose from. */
export function auditThings(): { value: string; label: string }[] {
  const kinds = new Set(Object.keys(AUDIT_WORDS).map((action) => action.split('.')[0]))
  kinds.delete('account')
  return [...kinds].map((value) => ({ value, label: capitalised(thingWords(value)) }))
}

export function thingWords(kind: string): string {
  return THINGS[kind] ?? `${kind.replaceAll('-', ' ')}s`
}
