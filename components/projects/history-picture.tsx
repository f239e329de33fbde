import Link from 'next/link'
import { useDates, useDisplay, usePreferences } from '@/lib/client/display'
import { formatDisplacement, formatSwing } from '@/lib/display-units'
import { historyMarks } from '@/lib/figures/history-marks'
import { amplitudeOf, peakToPeakOf, type HistoryPoint } from '@/lib/findings/project-history'
import { formatNumber } from '@/lib/units'

const DIGITS = { significantDigits: 3 }

interface HistoryPictureProps {
  projectId: string
  history: readonly HistoryPoint[]
  summary: string
}

/** The worm over the years: the fundamental’s swing as filled dots, peak-to-peak as hollow squares. Each pair leads to its analysis. */
export function HistoryPicture({ projectId, history, summary }: HistoryPictureProps) {
  const display = useDisplay()
  const isInPixels = usePreferences().displacementUnit === 'px'
  const { day } = useDates()
  const { points, ticks } = historyMarks(history, display)
  const swingName = display.swingMeasure === 'amplitude' ? 'worm amplitude' : 'worm’s fundamental, peak to peak'
  const peakName = display.swingMeasure === 'amplitude' ? 'peak to peak' : 'whole worm'
  const line = (of: 'swing' | 'peakToPeak') => points.map((point) => `${point.left},${point[of].top}`).join(' ')
  return (
    <figure className="text-sm" aria-label={summary}>
      <p className="figures mb-2 pl-12 text-xs text-soft" aria-hidden="true">
        ″ of axis
      </p>
      <div className="flex">
        <div className="figures relative h-48 w-12 shrink-0 text-xs text-soft" aria-hidden="true">
          {ticks.map(({ top, value }) => (
            <span key={value} className="absolute right-2 -translate-y-1/2" style={{ top: `${100 * top}%` }}>
              {formatNumber(value, value % 1 === 0 ? 0 : 1)}
            </span>
          ))}
        </div>
        <div className="relative h-48 min-w-0 flex-1">
          <svg viewBox="0 0 1 1" preserveAspectRatio="none" className="absolute inset-0 size-full" aria-hidden="true">
            {ticks.map(({ top, value }) => (
              <line
                key={value}
                x1="0"
                x2="1"
                y1={top}
                y2={top}
                className={value === 0 ? 'stroke-soft' : 'stroke-faint'}
                vectorEffect="non-scaling-stroke"
              />
            ))}
            <polyline
              points={line('peakToPeak')}
              fill="none"
              strokeDasharray="4 4"
              className="stroke-steel"
              vectorEffect="non-scaling-stroke"
            />
            <polyline
              points={line('swing')}
              fill="none"
              strokeWidth="2"
              className="stroke-brass"
              vectorEffect="non-scaling-stroke"
            />
            {points.map(({ left, swing, peakToPeak }, index) => (
              <g key={history[index].analysisId}>
                <ErrorBar left={left} span={peakToPeak.span} className="stroke-steel" />
                <ErrorBar left={left} span={swing.span} className="stroke-brass" />
              </g>
            ))}
          </svg>
          {points.map(({ left, swing, peakToPeak }, index) => {
            const point = history[index]
            const text = `${point.runName}, ${day(point.at)}: ${swingName} ${formatSwing(amplitudeOf(point), display, DIGITS)}, ${peakName} ${formatDisplacement(peakToPeakOf(point), display, DIGITS)}`
            return (
              <Link
                key={point.analysisId}
                href={`/projects/${projectId}/analyses/${point.analysisId}`}
                aria-label={text}
                title={text}
                className="absolute inset-y-0 w-6 -translate-x-1/2 rounded-control pointer-coarse:w-11"
                style={{ left: `${100 * left}%` }}
              >
                <span
                  className="absolute left-1/2 size-2.5 -translate-1/2 border-2 border-steel bg-card"
                  style={{ top: `${100 * peakToPeak.top}%` }}
                />
                <span
                  className="absolute left-1/2 size-2.5 -translate-1/2 rounded-full bg-brass-fill"
                  style={{ top: `${100 * swing.top}%` }}
                />
              </Link>
            )
          })}
        </div>
      </div>
      <div className="figures mt-1 ml-12 flex justify-between text-xs text-soft" aria-hidden="true">
        <span>{day(history[0].at)}</span>
        {history.length > 1 ? <span>{day(history[history.length - 1].at)}</span> : null}
      </div>
      <ul className="mt-3 flex flex-wrap gap-x-5 gap-y-1 text-soft">
        <li className="flex items-center gap-2">
          <span className="size-2.5 rounded-full bg-brass-fill" aria-hidden="true" />
          {swingName}
        </li>
        <li className="flex items-center gap-2">
          <span className="size-2.5 border-2 border-steel bg-card" aria-hidden="true" />
          peak to peak of the periodic part
        </li>
        <li>bars: one standard error to either side</li>
      </ul>
      {isInPixels ? (
        <p className="mt-2 text-soft">The history stays in arc seconds: a pixel is not the same from run to run.</p>
      ) : null}
    </figure>
  )
}

interface ErrorBarProps {
  left: number
  span: { top: number; bottom: number } | null
  className: string
}

function ErrorBar({ left, span, className }: ErrorBarProps) {
  if (!span) return null
  return (
    <line
      x1={left}
      x2={left}
      y1={span.top}
      y2={span.bottom}
      strokeWidth="2"
      className={className}
      vectorEffect="non-scaling-stroke"
    />
  )
}
