'use client'

import { useState } from 'react'
import { useForm } from 'react-hook-form'
import { Button } from '@/components/ui/button'
import { Card } from '@/components/ui/card'
import { Field } from '@/components/ui/field'
import { Notice } from '@/components/ui/notice'
import { TextInput } from '@/components/ui/text-input'
import { showServerFaults } from '@/lib/client/server-fields'

interface VerifyFormProps {
  asksPassword: boolean
  action: string
  onFollow: (password: string | undefined) => Promise<void>
}

/** The button that uses the link, with the password where another browser signed up. */
export function VerifyForm({ asksPassword, action, onFollow }: VerifyFormProps) {
  const [fault, setFault] = useState<string | null>(null)
  const { register, handleSubmit, setError, formState } = useForm<{ password: string }>()
  const { errors, isSubmitting } = formState

  async function submit({ password }: { password: string }) {
    setFault(null)
    try {
      await onFollow(asksPassword ? password : undefined)
    } catch (error) {
      setFault(showServerFaults(error, ['password'], setError))
    }
  }

  return (
    <Card className="p-6 max-sm:p-4">
      <form method="post" noValidate onSubmit={handleSubmit(submit)} className="flex flex-col gap-4">
        {asksPassword ? (
          <Field label="Password" hint="The one that was chosen when signing up." error={errors.password?.message}>
            {(control) => (
              <TextInput
                {...control}
                type="password"
                autoComplete="current-password"
                {...register('password', { required: 'Type the password that was chosen when signing up' })}
              />
            )}
          </Field>
        ) : null}
        {fault ? (
          <Notice tone="error" title="Nothing was changed" isLive>
            {fault}
          </Notice>
        ) : null}
        <div>
          <Button type="submit" variant="primary" disabled={isSubmitting}>
            {action}
          </Button>
        </div>
      </form>
    </Card>
  )
}
