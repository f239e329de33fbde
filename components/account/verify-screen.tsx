'use client'

import Link from 'next/link'
import { useState } from 'react'
import { PageHeading } from '@/components/shell/page-heading'
import { ButtonAnchor, ButtonLink } from '@/components/ui/button'
import { RequestError, sendJson } from '@/lib/client/fetcher'
import { openAfresh } from '@/lib/client/open-afresh'
import { verifiedSchema } from '@/lib/schemas/accounts'
import { useTokenOutOfAddress } from './use-token-out-of-address'
import { VerifyForm } from './verify-form'

export type LinkState = 'sign-up' | 'sign-up-elsewhere' | 'change-email' | 'ended'

const WORDS = {
  'sign-up': {
    title: 'One step left: make your account',
    lead: 'You have shown that this address is yours.',
    action: 'Make my account',
  },
  'sign-up-elsewhere': {
    title: 'One step left: make your account',
    lead: 'You signed up in another browser. Somebody else may have typed your address there, so the password that was chosen is asked for once.',
    action: 'Make my account',
  },
  'change-email': {
    title: 'Confirm your new address',
    lead: 'From then on you sign in with it. Other sessions of yours end, and the address that you had gets a mail.',
    action: 'Use this address',
  },
} as const

/** Where the link in a mail leads. Looking at it changes nothing: programs that check mails follow links too. */
export function VerifyScreen({ token, state }: { token: string; state: LinkState }) {
  const [isEnded, setEnded] = useState(state === 'ended')
  const [isTaken, setTaken] = useState<string | null>(null)
  const [newEmail, setNewEmail] = useState<string | null>(null)
  useTokenOutOfAddress()

  async function follow(password: string | undefined) {
    try {
      const verified = await sendJson('POST', '/api/auth/verify-email', { token, password }, verifiedSchema)
      if (verified.outcome === 'account-made') openAfresh(verified.next ?? '/projects')
      else setNewEmail(verified.email)
    } catch (error) {
      if (!(error instanceof RequestError)) throw error
      if (error.code === 'link-ended') setEnded(true)
      else if (error.code === 'in-use') setTaken(error.message)
      else throw error
    }
  }

  if (newEmail) {
    return (
      <>
        <PageHeading title="Your address was changed" lead={`You sign in with ${newEmail} from now on.`} />
        <div>
          <ButtonAnchor variant="primary" href="/account">
            To your account
          </ButtonAnchor>
        </div>
      </>
    )
  }
  if (isTaken) {
    return (
      <>
        <PageHeading title="This address has an account" lead={isTaken} />
        <div className="flex flex-wrap gap-2">
          <ButtonLink variant="primary" href="/sign-in">
            Sign in
          </ButtonLink>
          <ButtonLink href="/reset-password">Set a new password</ButtonLink>
        </div>
      </>
    )
  }
  if (isEnded || state === 'ended') return <EndedLink />
  const { title, lead, action } = WORDS[state]
  return (
    <>
      <PageHeading title={title} lead={lead} />
      <VerifyForm asksPassword={state === 'sign-up-elsewhere'} action={action} onFollow={follow} />
      {state === 'sign-up-elsewhere' ? (
        <p>
          It was not you, or the password is forgotten?{' '}
          <Link className="link" href="/sign-up">
            Sign up here
          </Link>{' '}
          instead. Without the password this link makes no account.
        </p>
      ) : null}
    </>
  )
}

function EndedLink() {
  return (
    <>
      <PageHeading
        title="This link opens nothing any more"
        lead="It was used already, has run out, or a newer mail has replaced it. If you have followed it before, sign in. Otherwise ask for a new mail: sign up again, or change your address on your account’s page."
      />
      <div className="flex flex-wrap gap-2">
        <ButtonLink variant="primary" href="/sign-in">
          Sign in
        </ButtonLink>
        <ButtonLink href="/sign-up">Sign up again</ButtonLink>
        <ButtonLink href="/account">To your account</ButtonLink>
      </div>
    </>
  )
}
