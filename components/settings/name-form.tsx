'use client'

import { useState } from 'react'
import { SaveTroubles } from '@/components/projects/save-troubles'
import { useSave } from '@/components/projects/use-save'
import { Button } from '@/components/ui/button'
import { Field } from '@/components/ui/field'
import { TextInput } from '@/components/ui/text-input'
import { sendJson } from '@/lib/client/fetcher'
import { projectChangeSchema, projectSchema, type Project } from '@/lib/schemas/api'
import { canManageProject } from '@/lib/schemas/rights'

export function NameForm({ project, onSaved }: { project: Project; onSaved: (project: Project) => void }) {
  const [name, setName] = useState(project.name)
  const [nameFault, setNameFault] = useState<string | null>(null)
  const { save, isBusy, fault, fields, conflict, dropConflict } = useSave(projectSchema)

  if (!canManageProject(project) || project.archivedAt) {
    return (
      <>
        <p className="font-semibold wrap-anywhere">{project.name}</p>
        <p className="text-sm text-soft">
          {canManageProject(project) ? 'An archived project keeps its name.' : 'Only an owner changes the name.'}
        </p>
      </>
    )
  }

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
      <SaveTroubles
        thing="this project"
        fault={fields.name ? null : fault}
        conflict={conflict}
        theirs={(theirs) => `“${theirs.name}”`}
        onKeepMine={({ version: newest }) => void send(newest)}
        onTakeTheirs={(theirs) => {
          dropConflict()
          onSaved(theirs)
        }}
      />
      <div>
        <Button type="submit" disabled={isBusy || name === project.name}>
          Save the name
        </Button>
      </div>
    </form>
  )
}
