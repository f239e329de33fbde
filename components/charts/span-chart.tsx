import type { SpanResult } from '@/lib/analysis/types'
import { PLAIN_DISPLAY, sizedDisplacement, type Display } from '@/lib/display-units'

interface SpanRow {
  name: string
  arcsec: number
  look: string
}

interface SpanChartProps {
  spans: SpanResult
  summary: string
  display?: Display
}

/** What the raw track spans, and what is left of it as one part after another is taken away. */
export function SpanChart({ spans, summary, display = PLAIN_DISPLAY }: SpanChartProps) {
  const rows: SpanRow[] = [
    { name: 'raw track', arcsec: spans.rawArcsec, look: 'bg-steel opacity-50' },
    { name: 'drift taken away', arcsec: spans.afterDriftArcsec, look: 'bg-steel opacity-50' },
    { name: 'worm taken away too', arcsec: spans.afterWormArcsec, look: 'bg-brass-fill' },
    { name: 'other lines too', arcsec: spans.afterLinesArcsec, look: 'bg-verdigris' },
  ]
  const longest = Math.max(...rows.map((row) => row.arcsec), 1e-9)
  return (
    <dl
      aria-label={summary}
      className="grid grid-cols-[max-content_minmax(0,1fr)] items-center gap-x-6 gap-y-2.5 break-inside-avoid max-sm:gap-x-3"
    >
      {rows.map((row) => (
        <div key={row.name} className="col-span-2 grid grid-cols-subgrid items-center">
          <dt className="max-sm:text-sm">{row.name}</dt>
          <dd className="flex items-center gap-2.5">
            <span
              className={`block h-4.5 rounded-[2px] print:[print-color-adjust:exact] ${row.look}`}
              style={{ width: `${(82 * row.arcsec) / longest}%` }}
            />
            <span className="figures">{sizedDisplacement(row.arcsec, display)}</span>
          </dd>
        </div>
      ))}
    </dl>
  )
}
