'use client'

import type { ReactNode } from 'react'
import { ColumnMapper } from '@/components/import/column-mapper'
import { FileIntake } from '@/components/import/file-intake'
import { PageHeading, type Crumb } from '@/components/shell/page-heading'
import { Card } from '@/components/ui/card'
import type { ImportChoices } from '@/components/import/import-draft'
import type { KnownOptics } from '@/components/import/scale-fields'
import type { useFileReading } from './use-file-reading'

interface ReadingScreenProps {
  title: string
  lead: ReactNode
  crumbs?: readonly Crumb[]
  file: ReturnType<typeof useFileReading>
  onSample?: () => void
  knownOptics?: readonly KnownOptics[]
  submitLabel?: string
  onSubmit?: (choices: ImportChoices) => void
  /** Below the intake or above the mapper's buttons: names, progress, what went wrong. */
  children?: ReactNode
}

/** The page on which a file is brought in and its columns are named. */
export function ReadingScreen(props: ReadingScreenProps) {
  const { title, lead, crumbs, file, onSample, knownOptics, submitLabel, children } = props
  const { reading, isBusy } = file
  const isMapping = reading.kind === 'mapping'
  return (
    <>
      <PageHeading
        crumbs={crumbs}
        title={isMapping ? 'Which column is what?' : title}
        lead={isMapping ? 'These are the first rows as the file has them. Correct what was guessed wrong.' : lead}
      />
      {reading.kind === 'mapping' ? (
        <Card className="p-6 max-sm:p-4">
          <ColumnMapper
            fileName={reading.file.fileName}
            preview={reading.preview}
            draft={reading.draft}
            onDraft={file.setDraft}
            onLayout={(changes) => void file.correctLayout(changes)}
            onSubmit={(choices) => (props.onSubmit ?? ((chosen) => void file.read(chosen)))(choices)}
            onCancel={file.startOver}
            fault={reading.fault}
            knownOptics={knownOptics}
            submitLabel={submitLabel}
            isBusy={isBusy}
          >
            {children}
          </ColumnMapper>
        </Card>
      ) : (
        <>
          <FileIntake
            onFiles={([first]) => void file.take(first)}
            onSample={onSample}
            isBusy={isBusy}
            fault={reading.fault?.message ?? null}
          />
          {children}
        </>
      )}
    </>
  )
}
