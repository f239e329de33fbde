import type { Metadata } from 'next'
import { headers } from 'next/headers'
import { notFound } from 'next/navigation'
import { LocalMailScreen } from '@/components/local-mail/local-mail-screen'
import { PageFrame } from '@/components/shell/page-frame'
import { openLocalMailFolder } from '@/lib/server/local-mail'

export const metadata: Metadata = { title: 'Local mail', robots: { index: false } }

export default async function LocalMailPage() {
  if (!openLocalMailFolder(await headers())) notFound()
  return (
    <PageFrame>
      <LocalMailScreen />
    </PageFrame>
  )
}
