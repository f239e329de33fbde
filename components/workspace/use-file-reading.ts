'use client'

import { useCallback, useRef, useState } from 'react'
import { startDraft, withPreview, type ImportChoices, type ImportDraft } from '@/components/import/import-draft'
import type { IntakeFile } from '@/components/import/file-intake'
import type { BenchAnalysis } from '@/lib/client/use-analysis'
import type { ImportFault, TablePreview, TextLayout } from '@/lib/formats/types'

/** Where a file stands on its way to being read. */
export type FileReading =
  | { kind: 'waiting'; fault: ImportFault | null }
  | {
      kind: 'mapping'
      file: IntakeFile
      preview: TablePreview
      draft: ImportDraft
      fault: ImportFault | null
    }

interface FileReadingOptions {
  analysis: Pick<BenchAnalysis, 'preview' | 'loadFile'>
  earlier?: Parameters<typeof startDraft>[1]
  /** Called once the worker holds the run. */
  onRead: (file: IntakeFile, choices: ImportChoices) => void | Promise<void>
}

/** From a file to columns in the worker: preview, the user's choices, and the fault when it can't be read; nothing typed is lost. */
export function useFileReading({ analysis, earlier, onRead }: FileReadingOptions) {
  const [reading, setReading] = useState<FileReading>({ kind: 'waiting', fault: null })
  const [isBusy, setBusy] = useState(false)
  const { preview: previewBytes, loadFile } = analysis

  const take = useCallback(
    async (file: IntakeFile) => {
      setBusy(true)
      try {
        const outcome = await previewBytes(file.bytes)
        if (!outcome.ok) setReading({ kind: 'waiting', fault: outcome.fault })
        else {
          const { preview } = outcome
          const draft = startDraft(preview, earlier)
          setReading({ kind: 'mapping', file, preview, draft, fault: null })
        }
      } finally {
        setBusy(false)
      }
    },
    [previewBytes, earlier],
  )

  const setDraft = useCallback((draft: ImportDraft) => {
    setReading((now) => (now.kind === 'mapping' ? { ...now, draft } : now))
  }, [])

  // What has been corrected so far, also by changes whose preview is not there yet: two quick ones must add up.
  const corrected = useRef<{ file: IntakeFile; layout: Partial<TextLayout> } | null>(null)

  const correctLayout = useCallback(
    async (changes: Partial<TextLayout>) => {
      if (reading.kind !== 'mapping') return
      const { file } = reading
      const earlier = corrected.current?.file === file ? corrected.current.layout : {}
      const newest = { file, layout: { ...earlier, ...changes } }
      corrected.current = newest
      const outcome = await previewBytes(file.bytes, newest.layout)
      // A correction that leads nowhere is not shown, so it must not weigh on the next one.
      if (!outcome.ok && corrected.current === newest) corrected.current = { file, layout: earlier }
      else if (corrected.current !== newest) return
      setReading((now) => {
        if (now.kind !== 'mapping' || now.file !== file) return now
        if (!outcome.ok) return { ...now, fault: outcome.fault }
        const { preview } = outcome
        return { ...now, preview, draft: withPreview(now.draft, now.preview, preview), fault: null }
      })
    },
    [previewBytes, reading],
  )

  const read = useCallback(
    async (choices: ImportChoices) => {
      if (reading.kind !== 'mapping') return
      setBusy(true)
      try {
        const loaded = await loadFile(reading.file.bytes, choices.settings)
        if (!loaded.ok) setReading((now) => (now.kind === 'mapping' ? { ...now, fault: loaded.fault } : now))
        else {
          // The file's own absolute time is a fact of the run unless the form says otherwise.
          const { startedAtMs } = loaded
          const startedAt =
            choices.facts.startedAt ?? (startedAtMs === null ? null : new Date(startedAtMs).toISOString())
          await onRead(reading.file, { ...choices, facts: { ...choices.facts, startedAt } })
        }
      } finally {
        setBusy(false)
      }
    },
    [loadFile, onRead, reading],
  )

  const startOver = useCallback(() => setReading({ kind: 'waiting', fault: null }), [])

  return { reading, isBusy, take, setDraft, correctLayout, read, startOver }
}
