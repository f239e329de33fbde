'use client'

import { useDates } from '@/lib/client/display'
import type { Invitation } from '@/lib/schemas/people'

/** Where the mail of an invitation is, in words. */
export function MailState({ invitation }: { invitation: Invitation }) {
  const dates = useDates()
  switch (invitation.mail) {
    case 'on-its-way':
      return <>on its way</>
    case 'sent':
      return <span className="sm:whitespace-nowrap">sent {dates.minute(invitation.sentAt)}</span>
    case 'failing':
      return (
        <span className="text-oxide">{invitation.mailFault ?? 'The mail server does not answer; we keep trying.'}</span>
      )
  }
}

/** Until when the link opens the project, or since when it does not. */
export function ValidUntil({ invitation }: { invitation: Invitation }) {
  const dates = useDates()
  const at = dates.minute(invitation.expiresAt)
  return invitation.isExpired ? (
    <span className="text-oxide">expired {at}; send it again</span>
  ) : (
    <span className="sm:whitespace-nowrap">{at}</span>
  )
}
