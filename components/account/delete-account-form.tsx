'use client'

import { useState } from 'react'
import { useForm } from 'react-hook-form'
import { Button } from '@/components/ui/button'
import { Actions } from '@/components/ui/dialog'
import { Field } from '@/components/ui/field'
import { Notice } from '@/components/ui/notice'
import { TextInput } from '@/components/ui/text-input'
import { RequestError, sendOnly } from '@/lib/client/fetcher'
import { openAfresh } from '@/lib/client/open-afresh'
import { showServerFaults } from '@/lib/client/server-fields'

interface DeleteAccountFormProps {
  email: string
  onClose: () => void
  /** A project has become one that is in the way. */
  onBlocked: () => void
}

interface Values {
  email: string
  password: string
}

export function DeleteAccountForm({ email, onClose, onBlocked }: DeleteAccountFormProps) {
  const [fault, setFault] = useState<string | null>(null)
  const { register, handleSubmit, setError, formState } = useForm<Values>()
  const { errors, isSubmitting } = formState
  const isSame = (typed: string) =>
    typed.trim().toLowerCase() === email.toLowerCase() || 'This is not the address of your account'

  async function submit(values: Values) {
    setFault(null)
    try {
      await sendOnly('DELETE', '/api/account', values)
      openAfresh('/')
    } catch (error) {
      if (error instanceof RequestError && error.code === 'last-owner') onBlocked()
      setFault(showServerFaults(error, ['email', 'password'], setError))
    }
  }

  return (
    <form method="post" noValidate onSubmit={handleSubmit(submit)} className="mt-4 flex flex-col gap-3">
      <Field label={`Type ${email} to confirm`} error={errors.email?.message}>
        {(control) => (
          <TextInput {...control} type="email" autoComplete="off" {...register('email', { validate: isSame })} />
        )}
      </Field>
      <Field label="Your password" error={errors.password?.message}>
        {(control) => (
          <TextInput
            {...control}
            type="password"
            autoComplete="current-password"
            {...register('password', { required: 'Type your password' })}
          />
        )}
      </Field>
      {fault ? (
        <Notice tone="error" title="Nothing was deleted" isLive>
          {fault}
        </Notice>
      ) : null}
      <Actions>
        <Button onClick={onClose}>Keep it</Button>
        <Button type="submit" variant="danger" disabled={isSubmitting}>
          Delete my account for good
        </Button>
      </Actions>
    </form>
  )
}
