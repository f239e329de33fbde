'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useRouter } from 'next/navigation'
import { useState } from 'react'
import { Controller, useForm, useWatch } from 'react-hook-form'
import { useSWRConfig } from 'swr'
import { z } from 'zod'
import { Button, ButtonLink } from '@/components/ui/button'
import { Actions } from '@/components/ui/dialog'
import { Field } from '@/components/ui/field'
import { Notice } from '@/components/ui/notice'
import { NumberInput } from '@/components/ui/number-input'
import { TextInput } from '@/components/ui/text-input'
import { sendJson } from '@/lib/client/fetcher'
import { isProjectsKey, projectsKey } from '@/lib/client/project-data'
import { showServerFaults } from '@/lib/client/server-fields'
import { newProjectSchema, projectSchema } from '@/lib/schemas/api'
import { wormPeriodText } from './teeth'

const formSchema = z.object({
  name: newProjectSchema.shape.name,
  wheelTeeth: newProjectSchema.shape.driveTrain.shape.wheelTeeth,
})
type Values = z.infer<typeof formSchema>

export function NewProjectForm() {
  const router = useRouter()
  const { mutate } = useSWRConfig()
  const [fault, setFault] = useState<string | null>(null)
  const [teethFault, setTeethFault] = useState<string | null>(null)
  const { control, register, handleSubmit, setError, formState } = useForm<Values>({
    resolver: zodResolver(formSchema),
    defaultValues: { name: '', wheelTeeth: null },
  })
  const wheelTeeth = useWatch({ control, name: 'wheelTeeth' })

  async function submit({ name, wheelTeeth: teeth }: Values) {
    if (teethFault) return
    setFault(null)
    try {
      const driveTrain = { axisKind: 'worm', wheelTeeth: teeth, wormStarts: 1, stages: [] }
      const project = await sendJson('POST', projectsKey, { name, driveTrain }, projectSchema)
      await mutate(isProjectsKey)
      router.push(`/projects/${project.id}`)
    } catch (error) {
      setFault(showServerFaults(error, ['name', 'wheelTeeth'], setError))
    }
  }

  return (
    <form noValidate onSubmit={handleSubmit(submit)} className="flex flex-col gap-4">
      <Field
        label="Name"
        hint="One project holds one mount. Call it what people around it call it."
        error={formState.errors.name?.message}
      >
        {(field) => <TextInput {...field} autoComplete="off" {...register('name')} />}
      </Field>
      <Field
        label="Teeth of the worm wheel"
        error={teethFault ?? formState.errors.wheelTeeth?.message}
        hint={
          wheelTeeth === null
            ? 'From the maker’s data or a count. Leave it empty if unknown; a recording of three turns or more shows the period.'
            : undefined
        }
      >
        {(field) => (
          <Controller
            control={control}
            name="wheelTeeth"
            render={({ field: { value, onChange, onBlur, ref } }) => (
              <NumberInput
                {...field}
                ref={ref}
                value={value}
                onValue={onChange}
                onFault={setTeethFault}
                onBlur={onBlur}
                isInteger
                min={1}
                max={100_000}
                className="max-w-40"
              />
            )}
          />
        )}
      </Field>
      <p aria-live="polite" className="text-finding font-semibold">
        {wheelTeeth === null || teethFault ? null : (
          <>
            One turn of the worm takes <span className="text-brass">{wormPeriodText(wheelTeeth)}</span>
          </>
        )}
      </p>
      <p className="text-sm text-soft">Belts and gears in front of the worm can be added once the project is there.</p>
      {fault ? (
        <Notice tone="error" title="The project was not made" isLive>
          {fault}
        </Notice>
      ) : null}
      <Actions>
        <ButtonLink href="/projects">Cancel</ButtonLink>
        <Button type="submit" variant="primary" disabled={formState.isSubmitting}>
          Make the project
        </Button>
      </Actions>
    </form>
  )
}
