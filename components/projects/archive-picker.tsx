'use client'

import { useRef, useState } from 'react'
import { Button } from '@/components/ui/button'
import { classNames } from '@/components/ui/class-names'
import { NightFileNote } from '@/components/ui/night-file-note'

/** A place to drop one archive on, or to choose it. */
export function ArchivePicker({ onFile, isBusy }: { onFile: (file: File) => void; isBusy: boolean }) {
  const input = useRef<HTMLInputElement>(null)
  const [isOver, setOver] = useState(false)
  const [isNightNoteOpen, setNightNoteOpen] = useState(false)

  function take(files: FileList | null) {
    setNightNoteOpen(false)
    if (files?.[0] && !isBusy) onFile(files[0])
  }

  function openDialog() {
    if (document.documentElement.dataset.theme === 'night' && !isNightNoteOpen) setNightNoteOpen(true)
    else input.current?.click()
  }

  return (
    <>
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
        onDragLeave={({ currentTarget, relatedTarget }) => {
          if (!(relatedTarget instanceof Node && currentTarget.contains(relatedTarget))) setOver(false)
        }}
        onDrop={(event) => {
          event.preventDefault()
          setOver(false)
          take(event.dataTransfer.files)
        }}
      >
        <p className="text-finding font-semibold">Drop a project’s archive here</p>
        <p className="max-w-[55ch] text-sm text-soft">
          The ZIP that “Download everything” in a project’s settings gave, as it is, up to 1 GB.
        </p>
        <input
          ref={input}
          type="file"
          accept=".zip,application/zip"
          aria-label="Archive file"
          tabIndex={-1}
          className="sr-only"
          disabled={isBusy}
          onChange={(event) => {
            take(event.target.files)
            event.target.value = ''
          }}
        />
        <Button variant="primary" disabled={isBusy} onClick={openDialog}>
          Choose an archive
        </Button>
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
    </>
  )
}
