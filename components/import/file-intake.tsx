'use client'

import { useRef, useState, type DragEvent } from 'react'
import { Button } from '@/components/ui/button'
import { classNames } from '@/components/ui/class-names'
import { NightFileNote } from '@/components/ui/night-file-note'
import { Notice } from '@/components/ui/notice'
import { tooLargeFault } from '@/lib/formats/faults'
import { MAX_FILE_BYTES } from '@/lib/formats/limits'
import { formatBytes } from '@/lib/units'
import { PasteBox } from './paste-box'

export interface IntakeFile {
  fileName: string
  bytes: Uint8Array<ArrayBuffer>
}

interface FileIntakeProps {
  /** The files that could be taken; one unless isMultiple. */
  onFiles: (files: IntakeFile[]) => void
  /** Offers the sample run. */
  onSample?: () => void
  isMultiple?: boolean
  isBusy?: boolean
  /** Why the last file was not taken, when its contents tell (an ImportFault's message). */
  fault?: string | null
}

interface Refusal {
  fileName: string
  message: string
}

/** Ways to bring a recording in: drop it, choose it, paste it, or take the sample. Nothing leaves the browser here. */
export function FileIntake({ onFiles, onSample, isMultiple = false, isBusy = false, fault = null }: FileIntakeProps) {
  const input = useRef<HTMLInputElement>(null)
  const [isOver, setOver] = useState(false)
  const [isPasting, setPasting] = useState(false)
  const [isNightNoteOpen, setNightNoteOpen] = useState(false)
  const [refusals, setRefusals] = useState<Refusal[]>([])

  async function take(list: FileList | readonly File[] | null | undefined) {
    const files = [...(list ?? [])].slice(0, isMultiple ? undefined : 1)
    if (files.length === 0) return
    setNightNoteOpen(false)
    const taken: IntakeFile[] = []
    const refused: Refusal[] = []
    for (const file of files) {
      if (file.size > MAX_FILE_BYTES) refused.push({ fileName: file.name, message: tooLargeFault(file.size).message })
      else {
        try {
          taken.push({ fileName: file.name, bytes: new Uint8Array(await file.arrayBuffer()) })
        } catch {
          const message =
            'The browser could not read it. Check that it is a file, not a folder, and that it is still there.'
          refused.push({ fileName: file.name, message })
        }
      }
    }
    setRefusals(refused)
    if (taken.length > 0) onFiles(taken)
  }

  function openDialog() {
    if (document.documentElement.dataset.theme === 'night' && !isNightNoteOpen) setNightNoteOpen(true)
    else input.current?.click()
  }

  function drop(event: DragEvent<HTMLDivElement>) {
    event.preventDefault()
    setOver(false)
    if (!isBusy) void take(event.dataTransfer.files)
  }

  return (
    <div className="flex flex-col gap-3">
      <div
        className={classNames(
          'flex flex-col items-center gap-3 rounded-card border border-dashed bg-card px-5 py-8 text-center max-sm:px-4 max-sm:py-6',
          isOver ? 'border-brass bg-faint' : 'border-steel',
        )}
        onDragEnter={(event) => {
          event.preventDefault()
          setOver(true)
        }}
        onDragOver={(event) => event.preventDefault()}
        onDragLeave={(event) => {
          if (!event.currentTarget.contains(asNode(event.relatedTarget))) setOver(false)
        }}
        onDrop={drop}
      >
        <p className="text-finding font-semibold">
          {isMultiple ? 'Drop recordings of a star here' : 'Drop a recording of a star here'}
        </p>
        <p className="text-sm text-soft">
          A table of text with a time and a displacement in each row, up to {formatBytes(MAX_FILE_BYTES)}. Delimiters,
          decimal marks and headers of all kinds are read.
        </p>
        <input
          ref={input}
          type="file"
          multiple={isMultiple}
          aria-label={isMultiple ? 'Recording files' : 'Recording file'}
          tabIndex={-1}
          className="sr-only"
          disabled={isBusy}
          onChange={(event) => {
            void take(event.target.files && [...event.target.files])
            event.target.value = ''
          }}
        />
        <div className="flex flex-wrap justify-center gap-2">
          <Button variant="primary" disabled={isBusy} onClick={openDialog}>
            {isMultiple ? 'Choose files' : 'Choose a file'}
          </Button>
          <Button disabled={isBusy} aria-expanded={isPasting} onClick={() => setPasting(!isPasting)}>
            Paste text
          </Button>
          {onSample ? (
            <Button disabled={isBusy} onClick={onSample}>
              Take the sample run
            </Button>
          ) : null}
        </div>
      </div>
      {isNightNoteOpen ? (
        <NightFileNote
          onOpen={() => {
            setNightNoteOpen(false)
            input.current?.click()
          }}
          onStay={() => setNightNoteOpen(false)}
        />
      ) : null}
      {isPasting ? (
        <PasteBox
          isBusy={isBusy}
          onText={(text) => {
            setRefusals([])
            onFiles([{ fileName: 'pasted text', bytes: new TextEncoder().encode(text) }])
          }}
        />
      ) : null}
      {refusals.map(({ fileName, message }) => (
        <Notice key={fileName} tone="error" title={`${fileName} was not taken`} isLive>
          {message}
        </Notice>
      ))}
      {fault && refusals.length === 0 ? (
        <Notice tone="error" title="The file could not be read" isLive>
          {fault}
        </Notice>
      ) : null}
    </div>
  )
}

function asNode(target: EventTarget | null): Node | null {
  return target instanceof Node ? target : null
}
