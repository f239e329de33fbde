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
import { meSchema, signUpSchema } from '@/lib/schemas/api'

type Values = z.input<typeof signUpSchema>

export function SignUpForm({ next }: { next: string }) {
  const [fault, setFault] = useState<string | null>(null)
  const { register, handleSubmit, setError, formState } = useForm<Values>({ resolver: zodResolver(signUpSchema) })
  const { errors, isSubmitting } = formState

  async function submit(values: Values) {
    setFault(null)
    try {
      await sendJson('POST', '/api/auth/sign-up', values, meSchema)
      openAfresh(next)
    } catch (error) {
      setFault(showServerFaults(error, ['displayName', 'email', 'password'], setError))
    }
  }

  return (
    <form method="post" noValidate onSubmit={handleSubmit(submit)} className="flex flex-col gap-4">
      <Field label="Name" hint="Others in your projects see it beside what you do." error={errors.displayName?.message}>
        {(control) => <TextInput {...control} autoComplete="name" {...register('displayName')} />}
      </Field>
      <Field label="E-mail" hint="You sign in with it; nobody else is shown it." error={errors.email?.message}>
        {(control) => <TextInput {...control} type="email" autoComplete="username" {...register('email')} />}
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
          Make an account
        </Button>
      </div>
    </form>
  )
}
