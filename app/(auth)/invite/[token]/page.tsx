import type { Metadata } from 'next'
import { InvitationScreen } from '@/components/invite/invitation-screen'
import { PageFrame } from '@/components/shell/page-frame'
import { currentUser } from '@/lib/server/current-user'
import { loadInvitationLink } from '@/lib/server/load-people'

export const metadata: Metadata = {
  title: 'Invitation',
  robots: { index: false, follow: false },
  referrer: 'no-referrer',
}

/** Only looks: programs that follow the links of a mail on their own must use nothing up. */
export default async function InvitationPage({ params }: PageProps<'/invite/[token]'>) {
  const { token } = await params
  const user = await currentUser()
  const link = await loadInvitationLink(token, user?.id ?? null)
  return (
    <PageFrame isNarrow>
      <InvitationScreen link={link} token={token} user={user && { displayName: user.displayName, email: user.email }} />
    </PageFrame>
  )
}
