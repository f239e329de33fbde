'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useForm, useWatch } from 'react-hook-form'
import useSWR from 'swr'
import { z } from 'zod'
import { Button } from '@/components/ui/button'
import { Actions, Dialog } from '@/components/ui/dialog'
import { Field } from '@/components/ui/field'
import { Notice } from '@/components/ui/notice'
import { Select } from '@/components/ui/select'
import { TextInput } from '@/components/ui/text-input'
import { getJson, RequestError } from '@/lib/client/fetcher'
import { LARGEST_PAGE, projectListSchema, type ProjectSummary } from '@/lib/schemas/lists'
import { canEditProject } from '@/lib/schemas/rights'

const newProject = 'new'
const nameRule = z.string().trim().max(120, { error: 'At most 120 characters' })
const saveSchema = z
  .object({ projectId: z.string(), projectName: nameRule, runName: nameRule, analysisName: nameRule })
  .superRefine((value, context) => {
    const needed =
      value.projectId === newProject
        ? (['projectName', 'runName', 'analysisName'] as const)
        : (['runName', 'analysisName'] as const)
    for (const path of needed) {
      if (value[path].length === 0) context.addIssue({ code: 'custom', path: [path], message: 'Give it a name' })
    }
  })

export interface SaveChoice {
  /** Null: make a project with this name first. */
  projectId: string | null
  projectName: string
  runName: string
  analysisName: string
}

interface SaveDialogProps {
  isOpen: boolean
  onClose: () => void
  defaults: { projectName: string; runName: string; analysisName: string }
  /** Rejects with an Error whose message can be shown; what was typed stays. */
  onSave: (choice: SaveChoice) => Promise<void>
  /** Called when the session turns out to have ended. */
  onSignedOut: () => void
  /** What is being done, for the line beside the button. */
  progressText: string | null
}

/** Asks under which mount and names the work on the open bench is to be kept. */
export function SaveDialog({ isOpen, onClose, onSignedOut, ...rest }: SaveDialogProps) {
  const { data, error } = useSWR<{ projects: ProjectSummary[] }, Error>(
    // The last changed ones; archived projects take nothing in.
    isOpen ? `/api/projects?limit=${LARGEST_PAGE}` : null,
    (url: string) => getJson(url, projectListSchema.pick({ projects: true })),
    { onError: (fault) => fault instanceof RequestError && fault.isSignedOut && onSignedOut() },
  )
  return (
    <Dialog isOpen={isOpen} onClose={onClose} title="Save this analysis">
      {error ? <Notice tone="error">{error.message}</Notice> : null}
      {data ? (
        <SaveForm projects={data.projects} onClose={onClose} {...rest} />
      ) : (
        <p className="text-soft">Looking up your projects…</p>
      )}
    </Dialog>
  )
}

function SaveForm({
  projects,
  defaults,
  onSave,
  onClose,
  progressText,
}: Omit<SaveDialogProps, 'isOpen' | 'onSignedOut'> & { projects: ProjectSummary[] }) {
  const writable = projects.filter(canEditProject)
  const { register, handleSubmit, control, setError, formState } = useForm({
    resolver: zodResolver(saveSchema),
    defaultValues: { projectId: writable[0]?.id ?? newProject, ...defaults },
  })
  const projectId = useWatch({ control, name: 'projectId' })
  // Once saved, the way on is under way: a second press would save twice.
  const { errors, isSubmitting, isSubmitSuccessful } = formState

  const submit = handleSubmit(async (values) => {
    try {
      await onSave({ ...values, projectId: values.projectId === newProject ? null : values.projectId })
    } catch (error) {
      setError('root', { message: error instanceof Error ? error.message : 'It could not be saved. Try again.' })
    }
  })

  return (
    <form onSubmit={submit} noValidate className="flex flex-col gap-4">
      <Field label="Project" hint="One project is one mount.">
        {(field) => (
          <Select
            {...field}
            {...register('projectId')}
            options={[
              ...writable.map((project) => ({ value: project.id, label: project.name })),
              { value: newProject, label: 'A new project' },
            ]}
          />
        )}
      </Field>
      {projectId === newProject ? (
        <Field label="Name of the new project" error={errors.projectName?.message}>
          {(field) => <TextInput {...field} {...register('projectName')} />}
        </Field>
      ) : null}
      <Field label="Name of the run" error={errors.runName?.message}>
        {(field) => <TextInput {...field} {...register('runName')} />}
      </Field>
      <Field label="Name of the analysis" error={errors.analysisName?.message}>
        {(field) => <TextInput {...field} {...register('analysisName')} />}
      </Field>
      {errors.root ? (
        <Notice tone="error" isLive>
          {errors.root.message}
        </Notice>
      ) : null}
      <Actions>
        {progressText ? (
          <p role="status" className="mr-auto text-sm text-soft">
            {progressText}
          </p>
        ) : null}
        <Button onClick={onClose}>Not now</Button>
        <Button type="submit" variant="primary" disabled={isSubmitting || isSubmitSuccessful}>
          Save
        </Button>
      </Actions>
    </form>
  )
}
