import type { Role } from '@/lib/schemas/api'
import type { Letter } from './letter'
import type { InvitationFacts, MailFacts, MentionFacts } from './mail-facts'
import { plainName } from './plain-name'

const LONGEST_QUOTE = 1000

const ROLE_SENTENCE: Record<Role, string> = {
  owner: 'You would be an owner: you can change everything in it and say who else may see it.',
  editor:
    'You would be an editor: you can upload runs, save analyses, write notes and make correction tables, and see all that the others made.',
  viewer: 'You would be a viewer: you can see, compare and download everything in it.',
}

const moment = new Intl.DateTimeFormat('en-GB', {
  weekday: 'long',
  day: 'numeric',
  month: 'long',
  year: 'numeric',
  hour: '2-digit',
  minute: '2-digit',
  timeZone: 'UTC',
})

const worksOnceUntil = (expiresAt: Date) => `The link works once, until ${moment.format(expiresAt)} UTC.`
const hello = (displayName: string) => `Hello ${plainName(displayName)},`
const plain = { greeting: null, quote: null, link: null, validity: null }

/** Words of a mail of any kind. @param origin of the links, without a slash at its end */
export function letterFor(facts: MailFacts, origin: string): Letter {
  switch (facts.kind) {
    case 'sign-up':
      return {
        ...plain,
        subject: 'Confirm your address for Turnwright',
        title: 'One step is left to your account',
        paragraphs: ['Open the link, and the account for this address is made.'],
        link: { label: 'Make the account', url: `${origin}/verify-email?token=${facts.token}` },
        validity: worksOnceUntil(facts.expiresAt),
        reason: `You get this mail because somebody typed this address when signing up at ${origin}. If it was not you, do nothing: without the link no account is made, and what was typed is deleted.`,
      }
    case 'sign-up-again':
      return {
        ...plain,
        subject: 'You have a Turnwright account already',
        title: 'This address has an account already',
        greeting: hello(facts.displayName),
        paragraphs: [
          'Somebody signed up with your address, so no second account was made and nothing was changed.',
          'Sign in with the password that you have. If you have forgotten it, the sign-in page leads on to a new one.',
        ],
        link: { label: 'Sign in', url: `${origin}/sign-in` },
        reason: `You get this mail because this address was typed when signing up at ${origin}. If it was not you, you need not do anything.`,
      }
    case 'reset-password':
      return {
        ...plain,
        subject: 'Set a new password for Turnwright',
        title: 'You can set a new password',
        greeting: hello(facts.displayName),
        paragraphs: ['Open the link and choose a new password for your account. Until then the old one stays.'],
        link: { label: 'Set a new password', url: `${origin}/reset-password?token=${facts.token}` },
        validity: worksOnceUntil(facts.expiresAt),
        reason: `You get this mail because somebody asked for a new password at ${origin} with your address. If it was not you, do nothing: your password stays as it is.`,
      }
    case 'password-changed':
      return {
        ...plain,
        subject: 'Your Turnwright password was changed',
        title: 'Your password was changed',
        greeting: hello(facts.displayName),
        paragraphs: [
          'The password of your account was changed, and the other sessions were ended.',
          'If it was you, all is well. If it was not, set a new one at once; the link to it comes to this address.',
        ],
        link: { label: 'Ask for a new password', url: `${origin}/reset-password` },
        reason: `You get this mail because this is the address of your account at ${origin}.`,
      }
    case 'change-email':
      return {
        ...plain,
        subject: 'Confirm your new address for Turnwright',
        title: 'Confirm that this address is yours',
        greeting: hello(facts.displayName),
        paragraphs: [
          'Open the link, and your account goes by this address from then on. Until then the old one stays.',
        ],
        link: { label: 'Use this address', url: `${origin}/verify-email?token=${facts.token}` },
        validity: worksOnceUntil(facts.expiresAt),
        reason: `You get this mail because somebody who is signed in at ${origin} gave this as their new address. If it was not you, do nothing: nothing is changed without the link.`,
      }
    case 'email-changed':
      return {
        ...plain,
        subject: 'Your Turnwright account has a new address',
        title: 'Your account no longer goes by this address',
        greeting: hello(facts.displayName),
        paragraphs: [
          'The address of your account was changed. From now on you sign in with the new one, and mail goes there.',
        ],
        link: { label: 'Open Turnwright', url: `${origin}/` },
        reason: `You get this mail because this was the address of your account at ${origin}. If it was not you who changed it, tell whoever runs it at once: a new password can’t be sent to this address any more.`,
      }
    case 'account-deleted':
      return {
        ...plain,
        subject: 'Your Turnwright account was deleted',
        title: 'Your account was deleted',
        greeting: hello(facts.displayName),
        paragraphs: [
          'Your address, your password and your sessions are gone. What you made in projects that others look after stays with these projects.',
        ],
        link: { label: 'Open Turnwright', url: `${origin}/` },
        reason: `You get this mail because this was the address of your account at ${origin}. If it was not you who deleted it, tell whoever runs it. No more mail comes to this address.`,
      }
    case 'invitation':
      return invitationLetter(facts, origin)
    case 'mention':
      return mentionLetter(facts, origin)
  }
}

function invitationLetter(
  { inviterName, projectName, role, token, expiresAt }: InvitationFacts,
  origin: string,
): Letter {
  const [inviter, project] = [plainName(inviterName), plainName(projectName)]
  return {
    ...plain,
    subject: `${inviter} invites you to “${project}” in Turnwright`,
    title: `${inviter} invites you to the project “${project}”`,
    paragraphs: [
      'Turnwright is a web workbench for the periodic error of telescope mounts; a project holds one mount, its runs and what was found in them.',
      ROLE_SENTENCE[role],
      'Open the link to accept. If you have no account yet, you can make one on the way.',
    ],
    link: { label: 'See the invitation', url: `${origin}/invite/${token}` },
    validity: worksOnceUntil(expiresAt),
    reason: `You get this mail because ${inviter} typed this address at ${origin}. If you don’t expect it, do nothing: without the link nothing happens.`,
  }
}

function mentionLetter(facts: MentionFacts, origin: string): Letter {
  const [actor, project, analysis] = [facts.actorName, facts.projectName, facts.analysisName].map(plainName)
  const words = Array.from(facts.noteText.trim())
  return {
    ...plain,
    subject: `${actor} named you in a note on “${analysis}”`,
    title: `${actor} named you in a note on “${analysis}”`,
    greeting: hello(facts.displayName),
    paragraphs: [`It belongs to the project “${project}”. The note says:`],
    quote: words.length > LONGEST_QUOTE ? `${words.slice(0, LONGEST_QUOTE).join('')}…` : words.join(''),
    link: { label: 'Open the analysis', url: `${origin}/projects/${facts.projectId}/analyses/${facts.analysisId}` },
    reason: `You get this mail because you are a member of this project at ${origin} and were named in the note. Whoever leaves the project gets no more of them.`,
  }
}
