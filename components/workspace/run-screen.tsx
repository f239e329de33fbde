'use client'

import { useRouter } from 'next/navigation'
import { useCallback, useEffect, useMemo, useRef, useState } from 'react'
import type { ImportChoices } from '@/components/import/import-draft'
import type { IntakeFile } from '@/components/import/file-intake'
import { PageHeading } from '@/components/shell/page-heading'
import { ButtonAnchor } from '@/components/ui/button'
import { EmptyState } from '@/components/ui/empty-state'
import { Notice } from '@/components/ui/notice'
import { importRun } from '@/lib/client/save-run'
import { useBenchAnalysis } from '@/lib/client/use-analysis'
import type { Project, Run } from '@/lib/schemas/api'
import { canEditProject, whyNoEdit } from '@/lib/schemas/rights'
import { ReadingScreen } from './reading-screen'
import { RunBench } from './run-bench'
import { RunFactsPanel } from './run-facts-panel'
import { useFileReading } from './use-file-reading'
import { WorkerFault } from './worker-fault'

/** A stored run: its bench once its columns are known, before that the form that names them. */
export function RunScreen({ project, run, userId }: { project: Project; run: Run; userId: string }) {
  if (run.status === 'uploaded') {
    return canEditProject(project) ? (
      <UnreadRun project={project} run={run} />
    ) : (
      <UnreadForReaders project={project} run={run} />
    )
  }
  return (
    <>
      <RunBench project={project} run={run} userId={userId} analysis={null} savedResult={null} />
      <RunFactsPanel run={run} whyReadOnly={whyNoEdit(project)} />
    </>
  )
}

/** The same for who may not say how to read it. */
function UnreadForReaders({ project, run }: { project: Project; run: Run }) {
  const root = `/projects/${project.id}`
  return (
    <>
      <PageHeading
        crumbs={[{ label: project.name, href: root }, { label: 'Runs', href: `${root}/runs` }, { label: run.name }]}
        title={`“${run.name}” is stored but not read yet`}
      />
      <EmptyState
        title="There is nothing to show until its columns are named"
        actions={
          <ButtonAnchor href={`/api${root}/runs/${run.id}/file`} download>
            Download the file
          </ButtonAnchor>
        }
      >
        {project.archivedAt
          ? 'An owner can open the project again; then an owner or an editor names the columns.'
          : 'An owner or an editor of this project names the columns.'}
      </EmptyState>
    </>
  )
}

/** The file is stored, but how to read it is not settled: an import was broken off or found a fault. */
function UnreadRun({ project, run }: { project: Project; run: Run }) {
  const router = useRouter()
  const analysis = useBenchAnalysis(null)
  const [fault, setFault] = useState<string | null>(null)

  const onRead = useCallback(
    async (_file: IntakeFile, { settings, conversion, facts }: ImportChoices) => {
      setFault(null)
      try {
        await importRun(run, { settings, conversion, facts })
        router.refresh()
      } catch (error) {
        setFault(error instanceof Error ? error.message : 'The columns could not be stored. Try again.')
      }
    },
    [router, run],
  )
  const earlier = useMemo(
    () => ({ lastImport: project.lastImport, wheelTeeth: project.driveTrain.wheelTeeth }),
    [project],
  )
  const file = useFileReading({ analysis, earlier, onRead })
  const { take } = file

  const isStarted = useRef(false)
  useEffect(() => {
    if (isStarted.current) return
    isStarted.current = true
    const fetchFile = async () => {
      const response = await fetch(`/api/projects/${run.projectId}/runs/${run.id}/file`)
      if (!response.ok) return setFault('The stored file could not be fetched. Reload the page to try again.')
      await take({ fileName: run.fileName, bytes: new Uint8Array(await response.arrayBuffer()) })
    }
    void fetchFile()
  }, [run, take])

  return (
    <ReadingScreen
      title={`“${run.name}” is stored but not read yet`}
      lead="Its file is being fetched, so that you can say which column is what. You may also bring the recording again."
      crumbs={[
        { label: project.name, href: `/projects/${project.id}` },
        { label: 'Runs', href: `/projects/${project.id}/runs` },
        { label: run.name },
      ]}
      file={file}
      submitLabel="Read this run"
    >
      <WorkerFault message={analysis.fault} />
      {fault ? (
        <Notice tone="error" isLive>
          {fault}
        </Notice>
      ) : null}
    </ReadingScreen>
  )
}
