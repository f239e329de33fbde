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
import { showServerFaults } from '@/lib/client/server-fields'
import { askResetSchema, mailOnItsWaySchema } from '@/lib/schemas/accounts'

type Values = z.input<typeof askResetSchema>

export function AskResetForm({ onSent }: { onSent: (email: string) => void }) {
  const [fault, setFault] = useState<string | null>(null)
  const { register, handleSubmit, setError, formState } = useForm<Values>({ resolver: zodResolver(askResetSchema) })

  async function submit(values: Values) {
    setFault(null)
    try {
      await sendJson('POST', '/api/auth/reset-password/ask', values, mailOnItsWaySchema)
      onSent(values.email)
    } catch (error) {
      setFault(showServerFaults(error, ['email'], setError))
    }
  }

  return (
    <form method="post" noValidate onSubmit={handleSubmit(submit)} className="flex flex-col gap-4">
      <Field label="E-mail" error={formState.errors.email?.message}>
        {(control) => <TextInput {...control} type="email" autoComplete="username" {...register('email')} />}
      </Field>
      {fault ? (
        <Notice tone="error" title="No mail was sent" isLive>
          {fault}
        </Notice>
      ) : null}
      <div>
        <Button type="submit" variant="primary" disabled={formState.isSubmitting}>
          Send the link
        </Button>
      </div>
    </form>
  )
}
