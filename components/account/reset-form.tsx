'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useState } from 'react'
import { useForm } from 'react-hook-form'
import type { z } from 'zod'
import { Button } from '@/components/ui/button'
import { Field } from '@/components/ui/field'
import { Notice } from '@/components/ui/notice'
import { RequestError, sendOnly } from '@/lib/client/fetcher'
import { openAfresh } from '@/lib/client/open-afresh'
import { showServerFaults } from '@/lib/client/server-fields'
import { resetPasswordSchema } from '@/lib/schemas/accounts'
import { NewPasswordInput } from './new-password-input'

const formSchema = resetPasswordSchema.pick({ password: true })
type Values = z.input<typeof formSchema>

export function ResetForm({ token, onEnded }: { token: string; onEnded: () => void }) {
  const [fault, setFault] = useState<string | null>(null)
  const { register, handleSubmit, setError, formState } = useForm<Values>({ resolver: zodResolver(formSchema) })

  async function submit({ password }: Values) {
    setFault(null)
    try {
      await sendOnly('POST', '/api/auth/reset-password', { token, password })
      openAfresh('/projects')
    } catch (error) {
      if (error instanceof RequestError && error.code === 'link-ended') onEnded()
      else setFault(showServerFaults(error, ['password'], setError))
    }
  }

  return (
    <form method="post" noValidate onSubmit={handleSubmit(submit)} className="flex flex-col gap-4">
      <Field label="New password" hint="At least 10 characters." error={formState.errors.password?.message}>
        {(control) => <NewPasswordInput {...control} {...register('password')} />}
      </Field>
      {fault ? (
        <Notice tone="error" title="The password was not changed" isLive>
          {fault}
        </Notice>
      ) : null}
      <div>
        <Button type="submit" variant="primary" disabled={formState.isSubmitting}>
          Set the password
        </Button>
      </div>
    </form>
  )
}
