'use client'

import { useState } from 'react'
import { Button } from '@/components/ui/button'
import { Checkbox } from '@/components/ui/checkbox'
import { Notice } from '@/components/ui/notice'
import type { Recipe } from '@/lib/analysis/types'
import type { RunFacts } from '@/lib/schemas/run-facts'
import { additionOnlyWarning, assumedSenseWarning, TABLE_CAUTIONS } from '@/lib/findings/correction-finding'

/** How a table is asked for: an addition where a correction was, or may have been, playing. */
export interface TableRequest {
  kind: 'stand-alone' | 'addition'
  /** True once the person has confirmed that the sense is only assumed; also where it is proven. */
  isAssumedSenseConfirmed: boolean
}

export interface MakeTableProps {
  recipe: Recipe
  mountCorrection: RunFacts['mountCorrection']
  onMakeTable?: (request: TableRequest) => void | Promise<void>
  onDownloadTable?: (format: 'csv' | 'json', request: TableRequest) => void | Promise<void>
  isReadOnly: boolean
}

/** The way to a table, behind what must be known first. */
export function MakeTable({ recipe, mountCorrection, onMakeTable, onDownloadTable, isReadOnly }: MakeTableProps) {
  const [isConfirmed, setConfirmed] = useState(false)
  const [isBusy, setBusy] = useState(false)
  const [fault, setFault] = useState<string | null>(null)
  const senseWarning = assumedSenseWarning(recipe)
  const additionWarning = additionOnlyWarning(mountCorrection)
  const isAllowed = senseWarning === null || isConfirmed
  const request: TableRequest = {
    kind: additionWarning === null ? 'stand-alone' : 'addition',
    isAssumedSenseConfirmed: senseWarning !== null && isConfirmed,
  }

  async function act(action: () => void | Promise<void>) {
    setBusy(true)
    setFault(null)
    try {
      await action()
    } catch (error) {
      setFault(error instanceof Error ? error.message : 'It did not work. Try again.')
    } finally {
      setBusy(false)
    }
  }

  return (
    <div className="no-print flex flex-col gap-2">
      {additionWarning ? (
        <Notice tone="warning" title="Only an addition" className="text-sm">
          <span className="text-sm">{additionWarning}</span>
        </Notice>
      ) : null}
      {senseWarning ? (
        <Notice tone="warning" title="The sense is assumed" className="text-sm">
          <span className="text-sm">{senseWarning}</span>
          <Checkbox
            className="mt-1.5 text-sm"
            label="I know that the sign of this table is not proven"
            checked={isConfirmed}
            onChange={(event) => setConfirmed(event.target.checked)}
          />
        </Notice>
      ) : null}
      {onMakeTable && !isReadOnly ? (
        <Button
          variant="primary"
          className="self-start"
          disabled={!isAllowed || isBusy}
          onClick={() => void act(() => onMakeTable(request))}
        >
          {request.kind === 'addition' ? 'Make an addition' : 'Make a correction table'}
        </Button>
      ) : null}
      {onDownloadTable ? (
        <div className="flex flex-wrap gap-2">
          {(['csv', 'json'] as const).map((format) => (
            <Button
              key={format}
              size="small"
              disabled={!isAllowed || isBusy}
              onClick={() => void act(() => onDownloadTable(format, request))}
            >
              Download {format.toUpperCase()}
            </Button>
          ))}
        </div>
      ) : null}
      {fault ? (
        <p role="alert" className="text-sm text-oxide">
          {fault}
        </p>
      ) : null}
      <ul className="flex flex-col gap-1.5 text-sm text-soft">
        {TABLE_CAUTIONS.map((caution) => (
          <li key={caution}>{caution}</li>
        ))}
      </ul>
    </div>
  )
}
