import type { Metadata } from 'next'
import { headers } from 'next/headers'
import { VerifyScreen } from '@/components/account/verify-screen'
import { PageFrame } from '@/components/shell/page-frame'
import { stateOfVerifyLink } from '@/lib/server/mail-links'

export const metadata: Metadata = { title: 'Confirm your address', robots: { index: false } }

export default async function VerifyEmailPage({ searchParams }: PageProps<'/verify-email'>) {
  const { token } = await searchParams
  const given = typeof token === 'string' ? token : ''
  const state = await stateOfVerifyLink(given, (await headers()).get('cookie'))
  return (
    <PageFrame isNarrow>
      <VerifyScreen token={given} state={state} />
    </PageFrame>
  )
}
