'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useForm } from 'react-hook-form'
import type { z } from 'zod'
import { Button } from '@/components/ui/button'
import { Field } from '@/components/ui/field'
import { TextInput } from '@/components/ui/text-input'
import { sendJson } from '@/lib/client/fetcher'
import { emailChangeSchema, mailOnItsWaySchema } from '@/lib/schemas/accounts'
import { FormOutcome } from './form-outcome'
import { useAccountForm } from './use-account-form'

type Values = z.input<typeof emailChangeSchema>

export function EmailForm({ email }: { email: string }) {
  const { register, handleSubmit, setError, resetField, formState } = useForm<Values>({
    resolver: zodResolver(emailChangeSchema),
  })
  const { fault, done, run } = useAccountForm<Values>(['email', 'password'], setError)

  const submit = handleSubmit((values) =>
    run(async () => {
      await sendJson('POST', '/api/account/email', values, mailOnItsWaySchema)
      resetField('password')
      return `A link is on its way to ${values.email}. Your address changes once you follow it; it holds for 24 hours.`
    }),
  )

  return (
    <form method="post" noValidate onSubmit={submit} className="flex max-w-md flex-col gap-3">
      <p>
        Your address is <strong className="font-semibold break-all">{email}</strong>.
      </p>
      <Field label="New address" error={formState.errors.email?.message}>
        {(control) => <TextInput {...control} type="email" autoComplete="email" {...register('email')} />}
      </Field>
      <Field label="Your password" error={formState.errors.password?.message}>
        {(control) => (
          <TextInput {...control} type="password" autoComplete="current-password" {...register('password')} />
        )}
      </Field>
      <FormOutcome fault={fault} done={done} title="No mail was sent" />
      <div>
        <Button type="submit" disabled={formState.isSubmitting}>
          Change the address
        </Button>
      </div>
    </form>
  )
}
