'use client'

import { useState, type ReactNode } from 'react'
import { figureCsv, type FigureTable } from '@/lib/figures/figure-table'
import { savePng, saveText } from './save-picture'
import { useChartColors } from './use-chart-colors'

export interface SvgPicture {
  svg: string
  width: number
  height: number
}

interface PictureProps {
  /** What the picture shows, for the names of files and of buttons: “track”. */
  name: string
  legend?: ReactNode
  /** The picture's numbers, for CSV. */
  table: FigureTable | null
  /** Draws the picture as a file; null while there is none. */
  toSvg: (() => Promise<SvgPicture | null>) | null
  children: ReactNode
  actions?: ReactNode
}

/** A picture with its legend and the buttons that take it away as SVG, PNG or CSV. */
export function Picture({ name, legend, table, toSvg, children, actions }: PictureProps) {
  const colors = useChartColors()
  const [fault, setFault] = useState<string | null>(null)

  async function download(kind: 'svg' | 'png') {
    try {
      const picture = await toSvg?.()
      if (!picture) return
      setFault(null)
      if (kind === 'svg') saveText(picture.svg, `${name}.svg`, 'image/svg+xml')
      else await savePng(picture.svg, { ...picture, fileName: `${name}.png`, ground: colors.card })
    } catch {
      setFault('The picture could not be drawn as a file. Try the other format.')
    }
  }

  return (
    <figure className="min-w-0">
      {children}
      <figcaption className="mt-1 flex flex-wrap items-center justify-between gap-x-5 gap-y-1 text-sm text-soft">
        <span className="flex flex-wrap items-center gap-x-5 gap-y-1">{legend}</span>
        <span className="no-print ml-auto flex items-center">
          {actions}
          <DownloadButton
            label={`Download the ${name} as SVG`}
            text="SVG"
            isDisabled={!toSvg}
            onClick={() => download('svg')}
          />
          <DownloadButton
            label={`Download the ${name} as PNG`}
            text="PNG"
            isDisabled={!toSvg}
            onClick={() => download('png')}
          />
          <DownloadButton
            label={`Download the numbers of the ${name} as CSV`}
            text="CSV"
            isDisabled={!table}
            onClick={() => table && saveText(figureCsv(table), `${name}.csv`, 'text/csv')}
          />
        </span>
      </figcaption>
      {fault ? (
        <p role="alert" className="text-sm text-oxide">
          {fault}
        </p>
      ) : null}
    </figure>
  )
}

function DownloadButton({
  label,
  text,
  isDisabled,
  onClick,
}: {
  label: string
  text: string
  isDisabled: boolean
  onClick: () => void
}) {
  return (
    <button
      type="button"
      aria-label={label}
      disabled={isDisabled}
      onClick={onClick}
      className="figures rounded-control px-1.5 py-1 text-xs text-soft hover:bg-faint hover:text-ink disabled:invisible pointer-coarse:min-h-11 pointer-coarse:min-w-11"
    >
      {text}
    </button>
  )
}

/** One entry of a legend: the line or mark as it is drawn, then its name. */
export function LegendEntry({ look, children }: { look: LegendLook; children: ReactNode }) {
  return (
    <span className="inline-flex items-center gap-2">
      <svg width="22" height="10" viewBox="0 0 22 10" aria-hidden="true">
        {look === 'stray' ? (
          <path d="M8 2l6 6M14 2l-6 6" className="stroke-oxide" strokeWidth="1.5" />
        ) : (
          <line x1="1" x2="21" y1="5" y2="5" {...lines[look]} />
        )}
      </svg>
      {children}
    </span>
  )
}

export type LegendLook = 'recorded' | 'fitted' | 'drift' | 'stray' | 'before' | 'chance' | 'error'

const lines: Record<
  Exclude<LegendLook, 'stray'>,
  { className: string; strokeWidth: number; strokeDasharray?: string }
> = {
  recorded: { className: 'stroke-steel', strokeWidth: 1.5 },
  fitted: { className: 'stroke-brass', strokeWidth: 3 },
  drift: { className: 'stroke-verdigris', strokeWidth: 2, strokeDasharray: '5 2.5' },
  before: { className: 'stroke-steel opacity-50', strokeWidth: 1 },
  chance: { className: 'stroke-oxide', strokeWidth: 2, strokeDasharray: '2 2.5' },
  error: { className: 'stroke-soft', strokeWidth: 1.25, strokeDasharray: '5 3' },
}
