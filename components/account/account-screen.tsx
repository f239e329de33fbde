'use client'

import { useState } from 'react'
import { PageHeading } from '@/components/shell/page-heading'
import { Button } from '@/components/ui/button'
import { Notice } from '@/components/ui/notice'
import { FactRow, SheetSection } from '@/components/ui/sheet-section'
import { sendOnly } from '@/lib/client/fetcher'
import { openAfresh } from '@/lib/client/open-afresh'
import { DisplaySection } from './display-section'

export function AccountScreen({ user }: { user: { displayName: string; email: string } }) {
  const [fault, setFault] = useState<string | null>(null)

  async function signOut() {
    setFault(null)
    try {
      await sendOnly('POST', '/api/auth/sign-out')
      openAfresh('/')
    } catch (error) {
      setFault(error instanceof Error ? error.message : 'Try again in a moment.')
    }
  }

  return (
    <>
      <PageHeading
        title={`You are signed in as ${user.displayName}`}
        actions={<Button onClick={() => void signOut()}>Sign out</Button>}
      />
      {fault ? (
        <Notice tone="error" title="You are still signed in" isLive>
          {fault}
        </Notice>
      ) : null}
      <SheetSection title="You" question="How others in your projects see you, and how you sign in.">
        <dl className="max-w-md">
          <FactRow name="name">
            <span className="font-sans">{user.displayName}</span>
          </FactRow>
          <FactRow name="e-mail">
            <span className="font-sans break-all">{user.email}</span>
          </FactRow>
        </dl>
      </SheetSection>
      <DisplaySection />
    </>
  )
}
