'use client'

import { useEffect, useRef, useState } from 'react'
import { useSWRConfig } from 'swr'
import { PageHeading } from '@/components/shell/page-heading'
import { ButtonLink } from '@/components/ui/button'
import { Notice } from '@/components/ui/notice'
import { ProgressBar } from '@/components/ui/progress-bar'
import { RequestError } from '@/lib/client/fetcher'
import { archiveFileFault, importArchive } from '@/lib/client/import-archive'
import { isProjectsKey } from '@/lib/client/project-data'
import { counted } from '@/lib/findings/words'
import type { Project } from '@/lib/schemas/api'
import { ArchivePicker } from './archive-picker'

type State =
  | { kind: 'waiting' }
  | { kind: 'sending'; fileName: string; fraction: number }
  | { kind: 'refused'; message: string; entries: [string, string][] }
  | { kind: 'done'; project: Project }

/** Makes a new project of an archive: chosen or dropped, sent, checked as a whole, and only then kept. */
export function ImportScreen() {
  const { mutate } = useSWRConfig()
  const [state, setState] = useState<State>({ kind: 'waiting' })
  const sending = useRef<AbortController | null>(null)
  useEffect(() => () => sending.current?.abort(), [])

  async function send(file: File) {
    const fault = archiveFileFault(file)
    if (fault) return setState({ kind: 'refused', message: fault, entries: [] })
    const controller = new AbortController()
    sending.current = controller
    setState({ kind: 'sending', fileName: file.name, fraction: 0 })
    try {
      const onProgress = (fraction: number) => setState({ kind: 'sending', fileName: file.name, fraction })
      const project = await importArchive(file, { onProgress, signal: controller.signal })
      await mutate(isProjectsKey)
      setState({ kind: 'done', project })
    } catch (error) {
      const message = error instanceof Error ? error.message : 'It could not be brought in. Try again.'
      const entries = error instanceof RequestError ? Object.entries(error.fields) : []
      setState({ kind: 'refused', message, entries })
    }
  }

  return (
    <>
      <PageHeading
        crumbs={[{ label: 'Projects', href: '/projects' }, { label: 'Bring in an archive' }]}
        title={
          state.kind === 'done' ? `“${state.project.name}” is here, with all that was in it` : 'Bring in an archive'
        }
        lead={
          state.kind === 'done'
            ? undefined
            : 'A downloaded project becomes a new project of yours. Who made what, and when, stays as it was; the people of the old one get no access by it.'
        }
      />
      <div className="flex max-w-3xl flex-col gap-4">
        {state.kind === 'done' ? <Arrived project={state.project} /> : null}
        {state.kind === 'sending' ? (
          <ProgressBar
            label={
              state.fraction < 1 ? `Sending ${state.fileName}` : 'Checking every file and reading the recordings again'
            }
            fraction={state.fraction < 1 ? state.fraction : null}
            onCancel={() => sending.current?.abort()}
          />
        ) : null}
        {state.kind === 'refused' ? <Refused message={state.message} entries={state.entries} /> : null}
        {state.kind === 'done' ? null : (
          <ArchivePicker onFile={(file) => void send(file)} isBusy={state.kind === 'sending'} />
        )}
      </div>
    </>
  )
}

function Arrived({ project }: { project: Project }) {
  const { id, runCount, analysisCount } = project
  return (
    <Notice
      tone="good"
      title="Every file was checked before anything was kept"
      isLive
      actions={
        <>
          <ButtonLink href={`/projects/${id}`} variant="primary">
            Open the project
          </ButtonLink>
          <ButtonLink href={`/projects/${id}/people`}>Invite people</ButtonLink>
        </>
      }
    >
      It holds {counted(runCount, 'run')} and {counted(analysisCount, 'analysis', 'analyses')}, with their notes and
      correction tables. So far nobody but you sees it.
    </Notice>
  )
}

function Refused({ message, entries }: { message: string; entries: [string, string][] }) {
  return (
    <Notice tone="error" title="Nothing was brought in" isLive>
      <p className="break-words">{message}</p>
      {entries.length > 1 ? (
        <ul className="mt-2 list-disc pl-5 text-sm break-words">
          {entries.map(([path, fault]) => (
            <li key={path}>
              <span className="figures">{path}</span>: {fault}
            </li>
          ))}
        </ul>
      ) : null}
    </Notice>
  )
}
