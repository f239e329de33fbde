'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useRouter } from 'next/navigation'
import { useForm } from 'react-hook-form'
import type { z } from 'zod'
import { Button } from '@/components/ui/button'
import { Field } from '@/components/ui/field'
import { TextInput } from '@/components/ui/text-input'
import { sendJson } from '@/lib/client/fetcher'
import { nameChangeSchema } from '@/lib/schemas/accounts'
import { meSchema } from '@/lib/schemas/api'
import { FormOutcome } from './form-outcome'
import { useAccountForm } from './use-account-form'

type Values = z.input<typeof nameChangeSchema>

export function NameForm({ displayName }: { displayName: string }) {
  const router = useRouter()
  const { register, handleSubmit, setError, formState } = useForm<Values>({
    resolver: zodResolver(nameChangeSchema),
    defaultValues: { displayName },
  })
  const { fault, done, run } = useAccountForm<Values>(['displayName'], setError)

  const submit = handleSubmit((values) =>
    run(async () => {
      await sendJson('PATCH', '/api/account', values, meSchema)
      // The head of the page shows the name as well.
      router.refresh()
      return 'Saved.'
    }),
  )

  return (
    <form method="post" noValidate onSubmit={submit} className="flex max-w-md flex-col gap-3">
      <Field label="Name" error={formState.errors.displayName?.message}>
        {(control) => <TextInput {...control} autoComplete="name" {...register('displayName')} />}
      </Field>
      <FormOutcome fault={fault} done={done} title="The name was not changed" />
      <div>
        <Button type="submit" disabled={formState.isSubmitting}>
          Save the name
        </Button>
      </div>
    </form>
  )
}
