'use client'

import { useMemo, useState } from 'react'
import { useSWRConfig } from 'swr'
import { Button } from '@/components/ui/button'
import { DataTable } from '@/components/ui/data-table'
import type { DataColumn } from '@/components/ui/data-table-model'
import { Notice } from '@/components/ui/notice'
import { useDates } from '@/lib/client/display'
import { sendJson, sendOnly } from '@/lib/client/fetcher'
import { invitationsUrl } from '@/lib/client/people-data'
import { invitationSchema, type Invitation } from '@/lib/schemas/people'
import { MailState, ValidUntil } from './mail-state'
import { RevokeDialog } from './revoke-dialog'

interface InvitationsTableProps {
  projectId: string
  invitations: readonly Invitation[]
  /** Nobody can join an archived project: its invitations can be revoked, not sent. */
  isArchived: boolean
}

/** Invitations that wait for an answer; what happens to the mail is read out as it happens. */
export function InvitationsTable({ projectId, invitations, isArchived }: InvitationsTableProps) {
  const dates = useDates()
  const { mutate } = useSWRConfig()
  const [busyId, setBusyId] = useState<string | null>(null)
  const [revoked, setRevoked] = useState<Invitation | null>(null)
  const [outcome, setOutcome] = useState<{ tone: 'good' | 'error'; text: string } | null>(null)
  const url = invitationsUrl(projectId)

  const columns = useMemo<DataColumn<Invitation>[]>(() => {
    async function resend({ id, email }: Invitation) {
      setBusyId(id)
      setOutcome(null)
      try {
        await sendJson('POST', `${url}/${id}/resend`, {}, invitationSchema)
        setOutcome({
          tone: 'good',
          text: `A new mail to ${email} is on its way. Once it is sent, the older link ends.`,
        })
      } catch (error) {
        setOutcome({ tone: 'error', text: error instanceof Error ? error.message : 'Try again in a moment.' })
      } finally {
        setBusyId(null)
        void mutate(url)
      }
    }
    return [
      {
        id: 'email',
        header: 'Invited',
        value: ({ email }) => email,
        cell: (invitation) => (
          <>
            <span className="break-all">{invitation.email}</span>
            <span className="block text-sm text-soft sm:hidden">
              as {invitation.role}, until <ValidUntil invitation={invitation} />
              <br />
              Mail: <MailState invitation={invitation} />
            </span>
          </>
        ),
      },
      { id: 'role', header: 'As', isSecondary: true, value: ({ role }) => role },
      {
        id: 'by',
        header: 'By',
        isSecondary: true,
        value: ({ invitedBy }) => invitedBy,
        cell: ({ invitedBy, createdAt }) => (
          <>
            {invitedBy}, <span className="whitespace-nowrap">{dates.day(createdAt)}</span>
          </>
        ),
      },
      {
        id: 'until',
        header: 'Valid until',
        isSecondary: true,
        value: ({ expiresAt }) => expiresAt,
        cell: (invitation) => <ValidUntil invitation={invitation} />,
      },
      {
        id: 'mail',
        header: 'Mail',
        isSecondary: true,
        value: ({ mail }) => mail,
        cell: (invitation) => (
          <span aria-live="polite">
            <MailState invitation={invitation} />
          </span>
        ),
      },
      {
        id: 'actions',
        header: 'What you can do',
        hasControls: true,
        value: () => null,
        cell: (invitation) => (
          <div className="flex flex-wrap justify-end gap-2 lg:flex-nowrap">
            {isArchived ? null : (
              <Button
                size="small"
                aria-label={`Send again to ${invitation.email}`}
                disabled={busyId === invitation.id}
                onClick={() => void resend(invitation)}
              >
                Send again
              </Button>
            )}
            <Button
              size="small"
              aria-label={`Revoke the invitation of ${invitation.email}`}
              onClick={() => setRevoked(invitation)}
            >
              Revoke
            </Button>
          </div>
        ),
      },
    ]
  }, [busyId, dates, isArchived, mutate, url])

  return (
    <>
      <DataTable caption="invitations" columns={columns} rows={invitations} rowId={({ id }) => id} />
      {outcome ? (
        <Notice tone={outcome.tone} isLive>
          {outcome.text}
        </Notice>
      ) : null}
      {revoked ? (
        <RevokeDialog
          invitation={revoked}
          onClose={() => {
            setRevoked(null)
            void mutate(url)
          }}
          onConfirm={() => sendOnly('DELETE', `${url}/${revoked.id}`)}
        />
      ) : null}
    </>
  )
}
