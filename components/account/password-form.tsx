'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useForm } from 'react-hook-form'
import { useSWRConfig } from 'swr'
import type { z } from 'zod'
import { Button } from '@/components/ui/button'
import { Field } from '@/components/ui/field'
import { TextInput } from '@/components/ui/text-input'
import { sendOnly } from '@/lib/client/fetcher'
import { passwordChangeSchema } from '@/lib/schemas/accounts'
import { FormOutcome } from './form-outcome'
import { NewPasswordInput } from './new-password-input'
import { SESSIONS_KEY } from './session-list'
import { useAccountForm } from './use-account-form'

type Values = z.input<typeof passwordChangeSchema>

export function PasswordForm() {
  const { mutate } = useSWRConfig()
  const { register, handleSubmit, setError, reset, formState } = useForm<Values>({
    resolver: zodResolver(passwordChangeSchema),
    defaultValues: { password: '', newPassword: '' },
  })
  const { fault, done, run } = useAccountForm<Values>(['password', 'newPassword'], setError)

  const submit = handleSubmit((values) =>
    run(async () => {
      await sendOnly('POST', '/api/account/password', values)
      reset()
      void mutate(SESSIONS_KEY)
      return 'Your password was changed, and your other sessions have ended.'
    }),
  )

  return (
    <form method="post" noValidate onSubmit={submit} className="flex max-w-md flex-col gap-3">
      <Field label="Present password" error={formState.errors.password?.message}>
        {(control) => (
          <TextInput {...control} type="password" autoComplete="current-password" {...register('password')} />
        )}
      </Field>
      <Field label="New password" hint="At least 10 characters." error={formState.errors.newPassword?.message}>
        {(control) => <NewPasswordInput {...control} {...register('newPassword')} />}
      </Field>
      <FormOutcome fault={fault} done={done} title="The password was not changed" />
      <div>
        <Button type="submit" disabled={formState.isSubmitting}>
          Change the password
        </Button>
      </div>
    </form>
  )
}
