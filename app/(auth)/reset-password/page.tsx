import type { Metadata } from 'next'
import { ResetScreen } from '@/components/account/reset-screen'
import { PageFrame } from '@/components/shell/page-frame'
import { isResetLinkOpen } from '@/lib/server/mail-links'

export const metadata: Metadata = { title: 'Set a new password', robots: { index: false } }

export default async function ResetPasswordPage({ searchParams }: PageProps<'/reset-password'>) {
  const { token } = await searchParams
  const given = typeof token === 'string' ? token : null
  const isOpen = given !== null && (await isResetLinkOpen(given))
  return (
    <PageFrame isNarrow>
      <ResetScreen token={isOpen ? given : null} isEnded={given !== null && !isOpen} />
    </PageFrame>
  )
}
