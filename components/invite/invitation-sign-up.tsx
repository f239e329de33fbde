'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useState } from 'react'
import { useForm } from 'react-hook-form'
import type { z } from 'zod'
import { Button } from '@/components/ui/button'
import { Field } from '@/components/ui/field'
import { Notice } from '@/components/ui/notice'
import { TextInput } from '@/components/ui/text-input'
import { sendJson } from '@/lib/client/fetcher'
import { openAfresh } from '@/lib/client/open-afresh'
import { showServerFaults } from '@/lib/client/server-fields'
import { invitationSignUpSchema, joinedSchema } from '@/lib/schemas/people'

const formSchema = invitationSignUpSchema.omit({ token: true })
type Values = z.input<typeof formSchema>

/** The account for the invited address; the link in the mail has proven it, so no other mail is needed. */
export function InvitationSignUp({ token, email }: { token: string; email: string }) {
  const [fault, setFault] = useState<string | null>(null)
  const { register, handleSubmit, setError, formState } = useForm<Values>({ resolver: zodResolver(formSchema) })
  const { errors, isSubmitting } = formState

  async function submit(values: Values) {
    setFault(null)
    try {
      const body = { ...values, token }
      const { projectId } = await sendJson('POST', '/api/invitations/sign-up', body, joinedSchema)
      openAfresh(`/projects/${projectId}`)
    } catch (error) {
      setFault(showServerFaults(error, ['displayName', 'password'], setError))
    }
  }

  return (
    <form method="post" noValidate onSubmit={handleSubmit(submit)} className="flex flex-col gap-4">
      <p>
        Make an account for <span className="font-semibold break-all">{email}</span> here, and you are in. You sign in
        with this address.
      </p>
      {/* So that password managers keep the address with the password. */}
      <input type="hidden" name="username" autoComplete="username" value={email} readOnly />
      <Field label="Name" hint="Others in your projects see it beside what you do." error={errors.displayName?.message}>
        {(control) => <TextInput {...control} autoComplete="name" {...register('displayName')} />}
      </Field>
      <Field label="Password" hint="At least 10 characters." error={errors.password?.message}>
        {(control) => <TextInput {...control} type="password" autoComplete="new-password" {...register('password')} />}
      </Field>
      {fault ? (
        <Notice tone="error" title="No account was made" isLive>
          {fault}
        </Notice>
      ) : null}
      <div>
        <Button type="submit" variant="primary" disabled={isSubmitting}>
          Make the account and join
        </Button>
      </div>
    </form>
  )
}
