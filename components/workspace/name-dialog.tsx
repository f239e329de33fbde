'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useForm } from 'react-hook-form'
import { z } from 'zod'
import { Button } from '@/components/ui/button'
import { Actions, Dialog } from '@/components/ui/dialog'
import { Field } from '@/components/ui/field'
import { Notice } from '@/components/ui/notice'
import { TextInput } from '@/components/ui/text-input'

const nameSchema = z.object({
  name: z.string().trim().min(1, { error: 'Give it a name' }).max(120, { error: 'At most 120 characters' }),
})

interface NameDialogProps {
  isOpen: boolean
  onClose: () => void
  title: string
  label: string
  initial: string
  /** Rejects with an Error whose message can be shown. */
  onName: (name: string) => Promise<void>
}

/** Asks for one name. */
export function NameDialog({ isOpen, onClose, title, ...rest }: NameDialogProps) {
  return (
    <Dialog isOpen={isOpen} onClose={onClose} title={title}>
      <NameForm onClose={onClose} {...rest} />
    </Dialog>
  )
}

function NameForm({ onClose, label, initial, onName }: Omit<NameDialogProps, 'isOpen' | 'title'>) {
  const { register, handleSubmit, setError, formState } = useForm({
    resolver: zodResolver(nameSchema),
    defaultValues: { name: initial.slice(0, 120) },
  })
  // Once saved, the way on is under way: a second press would save twice.
  const { errors, isSubmitting, isSubmitSuccessful } = formState
  const submit = handleSubmit(async ({ name }) => {
    try {
      await onName(name)
    } catch (error) {
      setError('root', { message: error instanceof Error ? error.message : 'It could not be saved. Try again.' })
    }
  })
  return (
    <form onSubmit={submit} noValidate className="flex flex-col gap-4">
      <Field label={label} error={errors.name?.message}>
        {(field) => <TextInput {...field} {...register('name')} />}
      </Field>
      {errors.root ? (
        <Notice tone="error" isLive>
          {errors.root.message}
        </Notice>
      ) : null}
      <Actions>
        <Button onClick={onClose}>Not now</Button>
        <Button type="submit" variant="primary" disabled={isSubmitting || isSubmitSuccessful}>
          Save
        </Button>
      </Actions>
    </form>
  )
}
