import type { Metadata } from 'next'
import Link from 'next/link'
import { redirect } from 'next/navigation'
import { SignInForm } from '@/components/account/sign-in-form'
import { PageFrame } from '@/components/shell/page-frame'
import { PageHeading } from '@/components/shell/page-heading'
import { Card } from '@/components/ui/card'
import { localPath } from '@/lib/client/local-path'
import { currentUser } from '@/lib/server/current-user'

export const metadata: Metadata = { title: 'Sign in' }

export default async function SignInPage({ searchParams }: PageProps<'/sign-in'>) {
  const next = localPath((await searchParams).next)
  if (await currentUser()) redirect(next)
  return (
    <PageFrame isNarrow>
      <PageHeading title="Sign in" lead="Work that you began on the open bench comes with you." />
      <Card className="p-6 max-sm:p-4">
        <SignInForm next={next} />
      </Card>
      <p>
        No account yet?{' '}
        <Link className="link" href={`/sign-up?${new URLSearchParams({ next })}`}>
          Make one
        </Link>
      </p>
    </PageFrame>
  )
}
