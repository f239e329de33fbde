'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useState } from 'react'
import { useForm } from 'react-hook-form'
import { Button } from '@/components/ui/button'
import { Field } from '@/components/ui/field'
import { Notice } from '@/components/ui/notice'
import { TextInput } from '@/components/ui/text-input'
import { showServerFaults } from '@/lib/client/server-fields'
import { signUpSchema } from '@/lib/schemas/api'
import { NewPasswordInput } from './new-password-input'
import type { SignUpValues } from './sign-up-screen'

interface SignUpFormProps {
  /** What was typed before, when another address is to be used. */
  values: SignUpValues | null
  /** Rejects with what the server found wrong. */
  onSend: (values: SignUpValues) => Promise<void>
}

export function SignUpForm({ values, onSend }: SignUpFormProps) {
  const [fault, setFault] = useState<string | null>(null)
  const { register, handleSubmit, setError, formState } = useForm<SignUpValues>({
    resolver: zodResolver(signUpSchema),
    defaultValues: values ?? undefined,
  })
  const { errors, isSubmitting } = formState

  async function submit(typed: SignUpValues) {
    setFault(null)
    try {
      await onSend(typed)
    } catch (error) {
      setFault(showServerFaults(error, ['displayName', 'email', 'password'], setError))
    }
  }

  return (
    <form method="post" noValidate onSubmit={handleSubmit(submit)} className="flex flex-col gap-4">
      <Field label="Name" hint="Others in your projects see it beside what you do." error={errors.displayName?.message}>
        {(control) => <TextInput {...control} autoComplete="name" {...register('displayName')} />}
      </Field>
      <Field
        label="E-mail"
        hint="You sign in with it; nobody else is shown it. We send a link there first."
        error={errors.email?.message}
      >
        {(control) => <TextInput {...control} type="email" autoComplete="username" {...register('email')} />}
      </Field>
      <Field label="Password" hint="At least 10 characters." error={errors.password?.message}>
        {(control) => <NewPasswordInput {...control} {...register('password')} />}
      </Field>
      {fault ? (
        <Notice tone="error" title="No account was made" isLive>
          {fault}
        </Notice>
      ) : null}
      <div>
        <Button type="submit" variant="primary" disabled={isSubmitting}>
          Make an account
        </Button>
      </div>
    </form>
  )
}
