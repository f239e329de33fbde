import type { Metadata } from 'next'
import { redirect } from 'next/navigation'
import { SignUpScreen } from '@/components/account/sign-up-screen'
import { PageFrame } from '@/components/shell/page-frame'
import { localPath } from '@/lib/client/local-path'
import { currentUser } from '@/lib/server/current-user'

export const metadata: Metadata = { title: 'Make an account' }

export default async function SignUpPage({ searchParams }: PageProps<'/sign-up'>) {
  const next = localPath((await searchParams).next)
  if (await currentUser()) redirect(next)
  return (
    <PageFrame isNarrow>
      <SignUpScreen next={next} />
    </PageFrame>
  )
}
