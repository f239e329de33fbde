'use client'

import { useState } from 'react'
import { PageHeading } from '@/components/shell/page-heading'
import { Button } from '@/components/ui/button'
import { Card } from '@/components/ui/card'
import { Notice } from '@/components/ui/notice'
import { AskResetForm } from './ask-reset-form'
import { ResetForm } from './reset-form'
import { useTokenOutOfAddress } from './use-token-out-of-address'

interface ResetScreenProps {
  /** Of a link that holds; null: ask for one. */
  token: string | null
  /** Whether a link was followed that does not hold any more. */
  isEnded: boolean
}

export function ResetScreen({ token, isEnded }: ResetScreenProps) {
  const [hasEnded, setEnded] = useState(isEnded)
  const [sentTo, setSentTo] = useState<string | null>(null)
  useTokenOutOfAddress()

  if (token && !hasEnded) {
    return (
      <>
        <PageHeading
          title="Choose a new password"
          lead="Wherever you are signed in, you will not be any more; here you will be."
        />
        <Card className="p-6 max-sm:p-4">
          <ResetForm token={token} onEnded={() => setEnded(true)} />
        </Card>
      </>
    )
  }
  if (sentTo) {
    return (
      <>
        <PageHeading
          title="Look into your mail"
          lead={
            <>
              If <strong className="font-semibold break-all text-ink">{sentTo}</strong> has an account, a link to set a
              new password is on its way there. It holds for an hour and works once.
            </>
          }
        />
        <p>Nothing there after a few minutes? Look among unwanted mail, or try the address that you signed up with.</p>
        <div>
          <Button onClick={() => setSentTo(null)}>Try another address</Button>
        </div>
      </>
    )
  }
  return (
    <>
      <PageHeading
        title="Set a new password by mail"
        lead="We send a link to the address of your account; you choose a new password where it leads."
      />
      {hasEnded ? (
        <Notice tone="warning" title="The link opens nothing any more">
          It was used already or has run out. Ask for a new one here.
        </Notice>
      ) : null}
      <Card className="p-6 max-sm:p-4">
        <AskResetForm onSent={setSentTo} />
      </Card>
    </>
  )
}
