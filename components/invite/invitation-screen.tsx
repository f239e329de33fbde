'use client'

import Link from 'next/link'
import { PageHeading } from '@/components/shell/page-heading'
import { ButtonLink } from '@/components/ui/button'
import { Card } from '@/components/ui/card'
import { useDates } from '@/lib/client/display'
import { linkEndWords } from '@/lib/findings/invitation-words'
import type { Role } from '@/lib/schemas/api'
import type { InvitationLink, OpenInvitation } from '@/lib/schemas/people'
import { aRole, isHigherRole, mayDo } from '@/lib/schemas/rights'
import { InvitationSignUp } from './invitation-sign-up'
import { JoinForm } from './join-form'

export interface Visitor {
  displayName: string
  email: string
}

interface InvitationScreenProps {
  link: InvitationLink
  token: string
  /** Null without a session. */
  user: Visitor | null
}

/** Who invites to what, and the way in that fits whoever looks. */
export function InvitationScreen({ link, token, user }: InvitationScreenProps) {
  const { end, invitation, memberRole } = link
  if (invitation && memberRole && (end || !isHigherRole(invitation.role, memberRole))) {
    return <AlreadyMember invitation={invitation} memberRole={memberRole} isOpen={end === null} />
  }
  if (end || !invitation) {
    const { title, remedy } = linkEndWords(end ?? 'unknown', invitation)
    return (
      <>
        <PageHeading title={title} lead={remedy} />
        <div>
          {user ? (
            <ButtonLink href="/projects">To your projects</ButtonLink>
          ) : (
            <ButtonLink href="/sign-in">Sign in</ButtonLink>
          )}
        </div>
      </>
    )
  }
  return <OpenLink invitation={invitation} token={token} user={user} memberRole={memberRole} />
}

interface AlreadyMemberProps {
  invitation: OpenInvitation
  memberRole: Role
  isOpen: boolean
}

function AlreadyMember({ invitation, memberRole, isOpen }: AlreadyMemberProps) {
  return (
    <>
      <PageHeading
        title={`You are in “${invitation.projectName}” already, as ${aRole(memberRole)}`}
        lead={
          isOpen
            ? `This invitation, as ${aRole(invitation.role)}, would not change that: an invitation never lowers a role. It stays open for the person whom it was sent to.`
            : 'This invitation is over, and you need it no longer.'
        }
      />
      <div>
        <ButtonLink variant="primary" href={`/projects/${invitation.projectId}`}>
          Open the project
        </ButtonLink>
      </div>
    </>
  )
}

interface OpenLinkProps {
  invitation: OpenInvitation
  token: string
  user: Visitor | null
  memberRole: Role | null
}

function OpenLink({ invitation, token, user, memberRole }: OpenLinkProps) {
  const dates = useDates()
  const { projectName, invitedBy, role, email, expiresAt, hasAccount } = invitation
  const signIn = `/sign-in?${new URLSearchParams({ next: `/invite/${token}` })}`
  return (
    <>
      <PageHeading
        title={`${invitedBy} invites you to “${projectName}” as ${aRole(role)}`}
        lead={`${role === 'viewer' ? 'A viewer' : `An ${role}`} may ${mayDo(role)}. The invitation holds until ${dates.dayAndTimeWithZone(expiresAt)}, and lets one person in.`}
      />
      <Card className="p-6 max-sm:p-4">
        {user ? (
          <JoinForm invitation={invitation} token={token} user={user} memberRole={memberRole} />
        ) : hasAccount ? (
          <div className="flex flex-col gap-4">
            <p>
              <span className="break-all">{email}</span> has an account. Sign in with it, or with another account of
              yours; you come back to this page and join.
            </p>
            <div>
              <ButtonLink variant="primary" href={signIn}>
                Sign in to join
              </ButtonLink>
            </div>
          </div>
        ) : (
          <InvitationSignUp token={token} email={email} />
        )}
      </Card>
      {!user && !hasAccount ? (
        <p>
          Have an account with another address?{' '}
          <Link className="link" href={signIn}>
            Sign in with it
          </Link>
        </p>
      ) : null}
    </>
  )
}
