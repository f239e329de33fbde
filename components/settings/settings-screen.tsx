'use client'

import { PageHeading } from '@/components/shell/page-heading'
import { ButtonLink } from '@/components/ui/button'
import { DataState } from '@/components/ui/data-state'
import { SheetSection } from '@/components/ui/sheet-section'
import { useOpticsPresets, useProject } from '@/lib/client/project-data'
import { capitalised, counted } from '@/lib/findings/words'
import { whyNoEdit } from '@/lib/schemas/rights'
import { ArchiveSection } from './archive-section'
import { DeleteSection } from './delete-section'
import { DownloadSection } from './download-section'
import { NameForm } from './name-form'
import { OpticsPresets } from './optics-presets'

export function SettingsScreen({ projectId }: { projectId: string }) {
  const project = useProject(projectId)
  const presets = useOpticsPresets(projectId)
  const data = project.data && presets.data ? { project: project.data, presets: presets.data.presets } : undefined
  return (
    <DataState
      what="the settings"
      data={data}
      error={project.error ?? presets.error}
      onRetry={() => void Promise.all([project.mutate(), presets.mutate()])}
    >
      {({ project: shown, presets: list }) => (
        <>
          <PageHeading
            crumbs={[{ label: shown.name, href: `/projects/${projectId}` }, { label: 'Settings' }]}
            title={
              shown.archivedAt
                ? 'This mount is put away until it is opened again'
                : list.length === 0
                  ? 'No optics are kept yet, so each run asks for its image scale'
                  : `${capitalised(counted(list.length, 'set'))} of optics kept for the next run`
            }
          />
          <SheetSection title="Name" question="What people around this mount call it.">
            <NameForm
              key={shown.version}
              project={shown}
              onSaved={(saved) => void project.mutate(saved, { revalidate: false })}
            />
          </SheetSection>
          <SheetSection
            title="Optics"
            question="A telescope and camera that are used together. Their image scale turns pixels into seconds of arc; its uncertainty scales every figure alike."
          >
            <OpticsPresets
              projectId={projectId}
              presets={list}
              whyReadOnly={whyNoEdit(shown)}
              onChanged={() => void presets.mutate()}
            />
          </SheetSection>
          <SheetSection title="Who did what" question="Every change to this project, with who made it and when.">
            <ButtonLink href={`/projects/${projectId}/settings/trail`}>To the log</ButtonLink>
          </SheetSection>
          <SheetSection title="Download everything" question="A copy to keep, in formats that other programs read.">
            <DownloadSection projectId={projectId} />
          </SheetSection>
          <SheetSection title="Archive" question="Is the work on this mount done for now?">
            <ArchiveSection project={shown} onSaved={(saved) => void project.mutate(saved, { revalidate: false })} />
          </SheetSection>
          <SheetSection title="Delete" question="The end of it, for everybody.">
            <DeleteSection project={shown} />
          </SheetSection>
        </>
      )}
    </DataState>
  )
}
