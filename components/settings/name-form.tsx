'use client'

import { useState } from 'react'
import { useSave } from '@/components/projects/use-save'
import { Button } from '@/components/ui/button'
import { ConflictNotice } from '@/components/ui/conflict-notice'
import { Field } from '@/components/ui/field'
import { Notice } from '@/components/ui/notice'
import { TextInput } from '@/components/ui/text-input'
import { formatMinute } from '@/lib/client/dates'
import { sendJson } from '@/lib/client/fetcher'
import { projectChangeSchema, projectSchema, type Project } from '@/lib/schemas/api'

export function NameForm({ project, onSaved }: { project: Project; onSaved: (project: Project) => void }) {
  const [name, setName] = useState(project.name)
  const [nameFault, setNameFault] = useState<string | null>(null)
  const { save, isBusy, fault, fields, conflict, dropConflict } = useSave(projectSchema)

  if (project.role !== 'owner') return <p>{project.name} – only its owner changes the name.</p>

  async function send(version: number) {
    const parsed = projectChangeSchema.shape.name.safeParse(name)
    setNameFault(parsed.success ? null : parsed.error.issues[0].message)
    if (!parsed.success) return
    const body = { version, name: parsed.data }
    const saved = await save(() => sendJson('PATCH', `/api/projects/${project.id}`, body, projectSchema))
    if (saved) onSaved(saved)
  }

  return (
    <form
      noValidate
      className="flex max-w-lg flex-col gap-3"
      onSubmit={(event) => {
        event.preventDefault()
        void send(project.version)
      }}
    >
      <Field label="Name of the mount" error={nameFault ?? fields.name}>
        {(control) => (
          <TextInput {...control} value={name} autoComplete="off" onChange={(event) => setName(event.target.value)} />
        )}
      </Field>
      {conflict ? (
        <ConflictNotice
          thing="this project"
          changedBy={conflict.changedBy}
          changedAt={conflict.changedAt && formatMinute(conflict.changedAt)}
          onKeepMine={() => void send(conflict.current.version)}
          onTakeTheirs={() => {
            dropConflict()
            onSaved(conflict.current)
          }}
        />
      ) : null}
      {fault && !fields.name ? (
        <Notice tone="error" title="Not saved" isLive>
          {fault}
        </Notice>
      ) : null}
      <div>
        <Button type="submit" disabled={isBusy || name === project.name}>
          Save the name
        </Button>
      </div>
    </form>
  )
}
