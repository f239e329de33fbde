import type { Metadata } from 'next'
import Link from 'next/link'
import { redirect } from 'next/navigation'
import { SignUpForm } from '@/components/account/sign-up-form'
import { PageFrame } from '@/components/shell/page-frame'
import { PageHeading } from '@/components/shell/page-heading'
import { Card } from '@/components/ui/card'
import { localPath } from '@/lib/client/local-path'
import { currentUser } from '@/lib/server/current-user'

export const metadata: Metadata = { title: 'Make an account' }

export default async function SignUpPage({ searchParams }: PageProps<'/sign-up'>) {
  const next = localPath((await searchParams).next)
  if (await currentUser()) redirect(next)
  return (
    <PageFrame isNarrow>
      <PageHeading
        title="Make an account"
        lead="To keep runs, analyses and correction tables of a mount together, and to share them. Work that you began on the open bench comes with you."
      />
      <Card className="p-6 max-sm:p-4">
        <SignUpForm next={next} />
      </Card>
      <p>
        Have one already?{' '}
        <Link className="link" href={`/sign-in?${new URLSearchParams({ next })}`}>
          Sign in
        </Link>
      </p>
    </PageFrame>
  )
}
