'use client'

import { useState } from 'react'
import { Button } from '@/components/ui/button'
import { Notice } from '@/components/ui/notice'
import { sendJson, sendOnly } from '@/lib/client/fetcher'
import { openAfresh } from '@/lib/client/open-afresh'
import type { Role } from '@/lib/schemas/api'
import { joinedSchema, type OpenInvitation } from '@/lib/schemas/people'
import { aRole } from '@/lib/schemas/rights'
import type { Visitor } from './invitation-screen'

interface JoinFormProps {
  invitation: OpenInvitation
  token: string
  user: Visitor
  /** A lower role that the visitor has in the project already. */
  memberRole: Role | null
}

/** For whoever is signed in, with the invited address or another one: the link is theirs either way. */
export function JoinForm({ invitation, token, user, memberRole }: JoinFormProps) {
  const [isBusy, setBusy] = useState(false)
  const [fault, setFault] = useState<string | null>(null)
  const isInvited = user.email.toLowerCase() === invitation.email.toLowerCase()

  async function attempt(work: () => Promise<string>) {
    setBusy(true)
    setFault(null)
    try {
      openAfresh(await work())
    } catch (error) {
      setFault(error instanceof Error ? error.message : 'It did not work. Try again.')
      setBusy(false)
    }
  }

  const join = () =>
    attempt(async () => {
      const { projectId } = await sendJson('POST', '/api/invitations/accept', { token }, joinedSchema)
      return `/projects/${projectId}`
    })
  const signOut = () =>
    attempt(async () => {
      await sendOnly('POST', '/api/auth/sign-out')
      return `/invite/${token}`
    })

  return (
    <div className="flex flex-col gap-4">
      {memberRole ? (
        <p>
          You are in this project already, as {aRole(memberRole)}; you would become {aRole(invitation.role)}.
        </p>
      ) : null}
      {isInvited ? (
        <p>
          You are signed in as {user.displayName} (<span className="break-all">{user.email}</span>).
        </p>
      ) : (
        <Notice title="You are signed in with another address">
          The invitation was sent to <span className="break-all">{invitation.email}</span>; you are signed in as{' '}
          {user.displayName} (<span className="break-all">{user.email}</span>). You may join as {user.displayName},
          since the link is yours. Or sign out first, and come in with the invited address.
        </Notice>
      )}
      {fault ? (
        <Notice tone="error" title="You have not joined" isLive>
          {fault}
        </Notice>
      ) : null}
      <div className="flex flex-wrap gap-2">
        <Button variant="primary" disabled={isBusy} onClick={() => void join()}>
          {memberRole ? `Become ${aRole(invitation.role)}` : `Join as ${user.displayName}`}
        </Button>
        {isInvited ? null : (
          <Button disabled={isBusy} onClick={() => void signOut()}>
            Sign out and use the invited address
          </Button>
        )}
      </div>
    </div>
  )
}
