import type { Role } from './api'

/** What each role may do in a project; the one place that says so, to the server and in words to people. */
export const RIGHTS = {
  viewer: { read: true, edit: false, unshare: false, manage: false },
  editor: { read: true, edit: true, unshare: true, manage: false },
  owner: { read: true, edit: true, unshare: true, manage: true },
} as const satisfies Record<Role, Record<string, boolean>>

/**
 * 'read': see everything, download. 'edit': runs, analyses, notes, share links, correction tables, optics, the drive train;
 * nobody while the project is archived. 'unshare': see share links and revoke them, then too. 'manage': the project itself, its people, and other people's notes.
 */
export type Right = keyof (typeof RIGHTS)[Role]

/** Those that people are told of; 'unshare' goes without saying where links can be made. */
const RIGHT_NAMES = ['read', 'edit', 'manage'] as const satisfies readonly Right[]
type NamedRight = (typeof RIGHT_NAMES)[number]

/** Each right in words that follow “may”. */
const RIGHT_WORDS: Record<NamedRight, string> = {
  read: 'read and download everything',
  edit: 'bring in runs, analyse, write notes, share analyses and make correction tables',
  manage: 'decide who is here, and rename, archive or delete the project',
}

function rightsOf(role: Role): NamedRight[] {
  return RIGHT_NAMES.filter((right) => RIGHTS[role][right])
}

/** What a role may do, in words that follow “may”. */
export function mayDo(role: Role): string {
  return rightsOf(role)
    .map((right) => RIGHT_WORDS[right])
    .join('; ')
}

export interface RightsChange {
  /** What the person may do from now on, in words that follow “may”; null: nothing new. */
  gained: string | null
  /** What the person may do no longer. */
  lost: string | null
}

export function rightsChange(before: Role, after: Role): RightsChange {
  const words = (rights: NamedRight[]) => rights.map((right) => RIGHT_WORDS[right]).join('; ') || null
  const [had, has] = [rightsOf(before), rightsOf(after)]
  return {
    gained: words(has.filter((right) => !had.includes(right))),
    lost: words(had.filter((right) => !has.includes(right))),
  }
}

/** Whether the first role may do more than the second. */
export function isHigherRole(role: Role, than: Role): boolean {
  return rightsOf(role).length > rightsOf(than).length
}

/** “an editor”, “a viewer”. */
export function aRole(role: Role): string {
  return role === 'viewer' ? 'a viewer' : `an ${role}`
}

/** Whether somebody of this role can change what is in the project now; nobody can while it is archived. */
export function canEditProject({ role, archivedAt }: { role: Role; archivedAt: string | null }): boolean {
  return RIGHTS[role].edit && archivedAt === null
}

/** Why somebody who reads the project changes nothing in it now; null where they can. */
export function whyNoEdit(project: { role: Role; archivedAt: string | null }): string | null {
  if (canEditProject(project)) return null
  return project.archivedAt === null
    ? 'You can read this project; its owners and editors change it.'
    : 'This project is archived; nothing in it changes until an owner opens it again.'
}

/** Whether somebody of this role decides about the project itself and its people, archived or not. */
export function canManageProject({ role }: { role: Role }): boolean {
  return RIGHTS[role].manage
}
