'use client'

import { useRouter } from 'next/navigation'
import { useCallback, useMemo, useState } from 'react'
import type { ImportChoices } from '@/components/import/import-draft'
import type { IntakeFile } from '@/components/import/file-intake'
import { Field } from '@/components/ui/field'
import { Notice } from '@/components/ui/notice'
import { TextInput } from '@/components/ui/text-input'
import { importRun, uploadRun } from '@/lib/client/save-run'
import { useBenchAnalysis } from '@/lib/client/use-analysis'
import type { OpticsPreset } from '@/lib/client/project-data'
import type { Project, Run } from '@/lib/schemas/api'
import { ReadingScreen } from './reading-screen'
import { useFileReading } from './use-file-reading'
import { WorkerFault } from './worker-fault'

interface RunUploadProps {
  project: Project
  presets: readonly OpticsPreset[]
}

/** Brings one recording into a project: named columns, stored byte for byte, then its bench. */
export function RunUpload({ project, presets }: RunUploadProps) {
  const router = useRouter()
  const analysis = useBenchAnalysis(null)
  const [name, setName] = useState('')
  const [step, setStep] = useState<string | null>(null)
  const [fault, setFault] = useState<string | null>(null)
  const [uploaded, setUploaded] = useState<{ file: IntakeFile; run: Run } | null>(null)

  const store = useCallback(
    async (file: IntakeFile, { settings, conversion, facts }: ImportChoices) => {
      setFault(null)
      try {
        const runName = name.trim() || file.fileName.replace(/\.[a-z0-9]{1,5}$/i, '').slice(0, 120)
        let run = uploaded?.file === file ? uploaded.run : null
        if (!run) {
          setStep('Storing the recording…')
          run = await uploadRun({ projectId: project.id, runName, ...file })
          setUploaded({ file, run })
        }
        setStep('Reading its columns…')
        await importRun(run, { settings, conversion, facts })
        router.push(`/projects/${project.id}/runs/${run.id}`)
      } catch (error) {
        setFault(error instanceof Error ? error.message : 'The run could not be stored. Try again.')
        setStep(null)
      }
    },
    [name, project.id, router, uploaded],
  )
  const earlier = useMemo(
    () => ({ lastImport: project.lastImport, wheelTeeth: project.driveTrain.wheelTeeth }),
    [project.lastImport, project.driveTrain.wheelTeeth],
  )
  const file = useFileReading({ analysis, earlier, onRead: store })
  const knownOptics = presets.map(({ id, name: presetName, imageScaleArcsecPerPx, imageScaleUncertaintyPercent }) => ({
    id,
    name: presetName,
    imageScaleArcsecPerPx,
    imageScaleUncertaintyPercent,
  }))

  return (
    <ReadingScreen
      title="Bring in a recording"
      lead={`It is kept byte for byte in “${project.name}”, together with what you say about it.`}
      crumbs={[
        { label: project.name, href: `/projects/${project.id}` },
        { label: 'Runs', href: `/projects/${project.id}/runs` },
        { label: 'New' },
      ]}
      file={{ ...file, isBusy: file.isBusy || step !== null }}
      knownOptics={knownOptics}
      submitLabel="Store this run"
    >
      {file.reading.kind === 'mapping' ? (
        <Field label="Name of the run" hint="Empty: the file’s own name." className="max-w-lg">
          {(control) => (
            <TextInput {...control} value={name} maxLength={120} onChange={(event) => setName(event.target.value)} />
          )}
        </Field>
      ) : null}
      {step ? (
        <p role="status" className="text-soft">
          {step}
        </p>
      ) : null}
      <WorkerFault message={analysis.fault} />
      {fault ? (
        <Notice tone="error" title="The run was not stored" isLive>
          {fault}
        </Notice>
      ) : null}
    </ReadingScreen>
  )
}
