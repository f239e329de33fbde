'use client'

import { useState } from 'react'
import { PageHeading } from '@/components/shell/page-heading'
import { Button } from '@/components/ui/button'
import { Notice } from '@/components/ui/notice'
import { SheetSection } from '@/components/ui/sheet-section'
import { sendOnly } from '@/lib/client/fetcher'
import { openAfresh } from '@/lib/client/open-afresh'
import { DeleteAccount } from './delete-account'
import { DisplaySection } from './display-section'
import { EmailForm } from './email-form'
import { NameForm } from './name-form'
import { PasswordForm } from './password-form'
import { SessionList } from './session-list'

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
      <SheetSection title="Name" question="How others in your projects see you.">
        <NameForm displayName={user.displayName} />
      </SheetSection>
      <SheetSection title="E-mail" question="You sign in with it, and mail about your projects goes there.">
        <EmailForm email={user.email} />
      </SheetSection>
      <SheetSection title="Password" question="Changing it ends your sessions everywhere but here.">
        <PasswordForm />
      </SheetSection>
      <DisplaySection />
      <SheetSection
        title="Sessions"
        question="Where you are signed in. End what you don’t know, and change your password."
      >
        <SessionList />
      </SheetSection>
      <SheetSection title="Delete the account" question="For good; nobody can bring it back.">
        <DeleteAccount email={user.email} />
      </SheetSection>
    </>
  )
}
