'use client'

import { SaveTroubles } from '@/components/projects/save-troubles'
import { useSave } from '@/components/projects/use-save'
import { Button } from '@/components/ui/button'
import { sendJson } from '@/lib/client/fetcher'
import { projectSchema, type Project } from '@/lib/schemas/api'
import { canManageProject } from '@/lib/schemas/rights'

/** Puts the project away so that nothing in it changes, or opens it again. */
export function ArchiveSection({ project, onSaved }: { project: Project; onSaved: (project: Project) => void }) {
  const { save, isBusy, fault, conflict, dropConflict } = useSave(projectSchema)
  const isArchived = project.archivedAt !== null

  async function send(version: number) {
    const body = { version, isArchived: !isArchived }
    const saved = await save(() => sendJson('PUT', `/api/projects/${project.id}/archived`, body, projectSchema))
    if (saved) onSaved(saved)
  }

  return (
    <div className="flex max-w-[65ch] flex-col gap-3">
      <p>
        {isArchived
          ? 'It is archived: everything can be read and downloaded, share links still open, and nothing can be changed.'
          : 'It is in use. Archived, everything can still be read and downloaded and share links still open, but nobody changes anything until an owner opens it again.'}
      </p>
      <SaveTroubles
        thing="this project"
        fault={fault}
        conflict={conflict}
        onKeepMine={({ version: newest }) => void send(newest)}
        onTakeTheirs={(theirs) => {
          dropConflict()
          onSaved(theirs)
        }}
      />
      {canManageProject(project) ? (
        <div>
          <Button disabled={isBusy} onClick={() => void send(project.version)}>
            {isArchived ? 'Open it again' : 'Archive this project'}
          </Button>
        </div>
      ) : (
        <p className="text-sm text-soft">Only an owner archives a project or opens it again.</p>
      )}
    </div>
  )
}
