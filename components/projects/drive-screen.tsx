'use client'

import { useState } from 'react'
import { PageHeading } from '@/components/shell/page-heading'
import { Button } from '@/components/ui/button'
import { DataState } from '@/components/ui/data-state'
import { focusFirstInvalid } from '@/components/ui/focus-first-invalid'
import { Notice } from '@/components/ui/notice'
import { SheetSection } from '@/components/ui/sheet-section'
import type { DriveTrain } from '@/lib/analysis/types'
import { sendJson } from '@/lib/client/fetcher'
import { useProject } from '@/lib/client/project-data'
import { findingText } from '@/lib/findings/finding'
import { driveFinding } from '@/lib/findings/drive-finding'
import { counted } from '@/lib/findings/words'
import { projectSchema, type Project } from '@/lib/schemas/api'
import { whyNoEdit } from '@/lib/schemas/rights'
import { DriveTrainEditor } from './drive-train-editor'
import { PredictedOrdersTable } from './predicted-orders-table'
import { SaveTroubles } from './save-troubles'
import { useSave } from './use-save'

export function DriveScreen({ projectId }: { projectId: string }) {
  const { data, error, mutate } = useProject(projectId)
  return (
    <DataState what="the drive train" data={data} error={error} onRetry={() => void mutate()}>
      {(project) => <DriveForm project={project} onSaved={(saved) => void mutate(saved, { revalidate: false })} />}
    </DataState>
  )
}

/** In one line; the whole of it is seen when it is taken. */
function theirDrive({ name, driveTrain }: Project): string {
  return `“${name}”: ${driveTrain.wheelTeeth} teeth on the worm wheel, ${counted(driveTrain.stages.length, 'further stage')}`
}

function DriveForm({ project, onSaved }: { project: Project; onSaved: (project: Project) => void }) {
  const [typed, setTyped] = useState<DriveTrain>(project.driveTrain)
  const [version, setVersion] = useState(project.version)
  const { save, isBusy, isSaved, fault, conflict, dropConflict } = useSave(projectSchema)
  const reason = whyNoEdit(project)
  const isReadOnly = reason !== null
  const isChanged = JSON.stringify(typed) !== JSON.stringify(project.driveTrain)

  async function send(fromVersion: number) {
    const body = { version: fromVersion, driveTrain: typed }
    const saved = await save(() => sendJson('PUT', `/api/projects/${project.id}/drive-train`, body, projectSchema))
    if (!saved) return
    setVersion(saved.version)
    onSaved(saved)
  }

  return (
    <>
      <PageHeading
        crumbs={[{ label: project.name, href: `/projects/${project.id}` }, { label: 'Drive train' }]}
        title={findingText(driveFinding(typed))}
        lead="Every part of the drive swings the axis at its own period. Knowing the teeth tells which swing comes from which part, and which of them a table for the worm can take out."
      />
      <SheetSection
        title="Parts"
        question="What turns the axis, from the worm wheel back to the motor? Count teeth or take them from the maker’s data."
        aside={<PredictedOrdersTable driveTrain={typed} />}
      >
        <form
          noValidate
          onSubmit={(event) => {
            event.preventDefault()
            if (focusFirstInvalid(event.currentTarget)) return
            void send(version)
          }}
        >
          <DriveTrainEditor value={typed} onValue={setTyped} isReadOnly={isReadOnly} key={version} />
          <div className="mt-5 flex flex-col gap-3">
            <SaveTroubles
              thing="this project"
              fault={fault}
              conflict={conflict}
              theirs={theirDrive}
              onKeepMine={({ version: newest }) => void send(newest)}
              onTakeTheirs={(theirs) => {
                setTyped(theirs.driveTrain)
                setVersion(theirs.version)
                dropConflict()
                onSaved(theirs)
              }}
            />
            {isSaved && !isChanged ? (
              <Notice tone="good" isLive>
                Saved. Runs analysed from now on use it; saved analyses keep the drive train that they were made with.
              </Notice>
            ) : null}
            {isReadOnly ? (
              <p className="text-sm text-soft">{reason}</p>
            ) : (
              <div>
                <Button type="submit" variant="primary" disabled={isBusy || !isChanged}>
                  Save the drive train
                </Button>
              </div>
            )}
          </div>
        </form>
      </SheetSection>
    </>
  )
}
