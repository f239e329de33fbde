'use client'

import Link from 'next/link'
import { useState } from 'react'
import type { z } from 'zod'
import { PageHeading } from '@/components/shell/page-heading'
import { Card } from '@/components/ui/card'
import { sendJson } from '@/lib/client/fetcher'
import { mailOnItsWaySchema } from '@/lib/schemas/accounts'
import type { signUpSchema } from '@/lib/schemas/api'
import { AwaitMail } from './await-mail'
import { SignUpForm } from './sign-up-form'

export type SignUpValues = z.input<typeof signUpSchema>

/** Signing up until the link in the mail is followed; what was typed stays on this page meanwhile. */
export function SignUpScreen({ next }: { next: string }) {
  const [values, setValues] = useState<SignUpValues | null>(null)
  const [isSent, setSent] = useState(false)

  async function send(typed: SignUpValues) {
    setValues(typed)
    await sendJson('POST', '/api/auth/sign-up', { ...typed, next }, mailOnItsWaySchema)
    setSent(true)
  }

  if (isSent && values) {
    return <AwaitMail email={values.email} next={next} onAgain={() => send(values)} onOther={() => setSent(false)} />
  }
  return (
    <>
      <PageHeading
        title="Make an account"
        lead="To keep runs, analyses and correction tables of a mount together, and to share them. Work that you began on the open bench comes with you."
      />
      <Card className="p-6 max-sm:p-4">
        <SignUpForm values={values} onSend={send} />
      </Card>
      <p>
        Have one already?{' '}
        <Link className="link" href={`/sign-in?${new URLSearchParams({ next })}`}>
          Sign in
        </Link>
      </p>
    </>
  )
}
