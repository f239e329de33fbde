'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import Link from 'next/link'
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
import { meSchema, signInSchema } from '@/lib/schemas/api'

type Values = z.input<typeof signInSchema>

export function SignInForm({ next }: { next: string }) {
  const [fault, setFault] = useState<string | null>(null)
  const { register, handleSubmit, setError, formState } = useForm<Values>({ resolver: zodResolver(signInSchema) })

  async function submit(values: Values) {
    setFault(null)
    try {
      await sendJson('POST', '/api/auth/sign-in', values, meSchema)
      openAfresh(next)
    } catch (error) {
      setFault(showServerFaults(error, ['email', 'password'], setError))
    }
  }

  return (
    <form method="post" noValidate onSubmit={handleSubmit(submit)} className="flex flex-col gap-4">
      <Field label="E-mail" error={formState.errors.email?.message}>
        {(control) => <TextInput {...control} type="email" autoComplete="username" {...register('email')} />}
      </Field>
      <Field label="Password" error={formState.errors.password && 'Type your password'}>
        {(control) => (
          <TextInput {...control} type="password" autoComplete="current-password" {...register('password')} />
        )}
      </Field>
      {fault ? (
        <Notice tone="error" title="Not signed in" isLive>
          {fault}
        </Notice>
      ) : null}
      <div className="flex flex-wrap items-center gap-x-4 gap-y-2">
        <Button type="submit" variant="primary" disabled={formState.isSubmitting}>
          Sign in
        </Button>
        <Link className="link" href="/reset-password">
          Forgot the password?
        </Link>
      </div>
    </form>
  )
}
