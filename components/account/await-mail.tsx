'use client'

import { useEffect, useRef, useState } from 'react'
import { PageHeading } from '@/components/shell/page-heading'
import { Button } from '@/components/ui/button'
import { Card } from '@/components/ui/card'
import { Notice } from '@/components/ui/notice'
import { useSignedInMeanwhile } from './use-signed-in-meanwhile'

interface AwaitMailProps {
  email: string
  next: string
  /** Rejects with an Error whose message can be shown. */
  onAgain: () => Promise<void>
  onOther: () => void
}

/** Says that a mail is on its way, and goes on by itself once its link was followed in this browser. */
export function AwaitMail({ email, next, onAgain, onOther }: AwaitMailProps) {
  const [isBusy, setBusy] = useState(false)
  const [againCount, setAgainCount] = useState(0)
  const [fault, setFault] = useState<string | null>(null)
  const heading = useRef<HTMLDivElement>(null)
  useSignedInMeanwhile(next)

  // The form that had the focus is gone; whoever can't see the page hears what came in its place.
  useEffect(() => heading.current?.focus(), [])

  async function again() {
    setBusy(true)
    setFault(null)
    try {
      await onAgain()
      setAgainCount((count) => count + 1)
    } catch (error) {
      setFault(error instanceof Error ? error.message : 'Try again in a moment.')
    } finally {
      setBusy(false)
    }
  }

  return (
    <>
      <div ref={heading} tabIndex={-1} className="outline-none">
        <PageHeading
          title="Look into your mail"
          lead={
            <>
              We have sent a link to <strong className="font-semibold break-all text-ink">{email}</strong>. Your account
              is made when you follow it, within 24 hours.
            </>
          }
        />
      </div>
      <Card className="flex flex-col gap-4 p-6 max-sm:p-4">
        <p>
          Follow it in this browser, and you can go on where you were; this page notices by itself. In another browser
          you will be asked for the password that you have just chosen.
        </p>
        <p className="text-soft">
          Nothing there? It may take a few minutes, or lie among unwanted mail. If you have an account with this address
          already, the mail says so.
        </p>
        {fault ? (
          <Notice tone="error" title="No further mail was sent" isLive>
            {fault}
          </Notice>
        ) : null}
        <p role="status" className={againCount > 0 && !fault ? undefined : 'sr-only'}>
          {againCount > 0 && !fault ? `Sent again${againCount > 1 ? `, ${againCount} times by now` : ''}.` : ''}
        </p>
        <div className="flex flex-wrap gap-2">
          <Button disabled={isBusy} onClick={() => void again()}>
            Send it again
          </Button>
          <Button onClick={onOther}>Use another address</Button>
        </div>
      </Card>
    </>
  )
}
