/** Why a link of an invitation opens nothing any more. */
export const LINK_ENDS = ['expired', 'used', 'revoked', 'replaced', 'archived', 'deleted', 'unknown'] as const
export type LinkEnd = (typeof LINK_ENDS)[number]

export interface LinkEndWords {
  /** What is so. */
  title: string
  /** What to do. */
  remedy: string
}

/** Null where the project, and with it the name of whoever invited, is gone. */
interface Invited {
  projectName: string
  invitedBy: string
}

/** What became of a link, and what to do; the page and the refusals of the server say the same. */
export function linkEndWords(end: LinkEnd, invited: Invited | null): LinkEndWords {
  const who = invited?.invitedBy ?? 'whoever invited you'
  const mount = invited ? `“${invited.projectName}”` : 'this project'
  switch (end) {
    case 'expired':
      return {
        title: 'This invitation has expired',
        remedy: `It was open for two weeks. Ask ${who} to send it again.`,
      }
    case 'used':
      return {
        title: 'This invitation has been used',
        remedy: `It lets one person in, once. If that was you, sign in and find ${mount} among your projects. If not, ask ${who} to invite you again.`,
      }
    case 'revoked':
      return {
        title: 'This invitation was taken back',
        remedy: `An owner of ${mount} revoked it. If you think that this is a mistake, ask ${who} to invite you again.`,
      }
    case 'replaced':
      return {
        title: 'A newer mail has replaced this link',
        remedy: `The invitation was sent again, and only the link in the newest mail works. Open that one; if you can’t find it, ask ${who} to send it once more.`,
      }
    case 'archived':
      return {
        title: `The project ${mount} is archived`,
        remedy: `Nobody can join while it is put away. Ask ${who} to open it again, then follow this link once more.`,
      }
    case 'deleted':
      return {
        title: 'The project of this invitation was deleted',
        remedy: 'There is nothing left to join. If you expected something else, ask whoever invited you.',
      }
    case 'unknown':
      return {
        title: 'This link opens nothing',
        remedy:
          'It may have lost a part on its way. Open it from the mail itself, or copy it from there as a whole. If that does not help, ask whoever invited you to send it again.',
      }
  }
}
