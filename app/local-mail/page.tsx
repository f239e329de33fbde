import type { Metadata } from 'next'
import { notFound } from 'next/navigation'
import { connection } from 'next/server'
import { LocalMailScreen } from '@/components/local-mail/local-mail-screen'
import { PageFrame } from '@/components/shell/page-frame'
import { openLocalMailFolder } from '@/lib/server/local-mail'

export const metadata: Metadata = { title: 'Local mail', robots: { index: false } }

export default async function LocalMailPage() {
  await connection()
  if (!openLocalMailFolder()) notFound()
  return (
    <PageFrame>
      <LocalMailScreen />
    </PageFrame>
  )
}
