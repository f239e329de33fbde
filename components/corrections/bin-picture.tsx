import { binBars, type BinBars } from '@/lib/figures/bin-bars'
import { formatNumber } from '@/lib/units'

interface BinPictureProps {
  values: readonly number[]
  /** What the bars show, over the axis: “what the table adds, ″”. */
  axisTitle: string
  /** The picture in words, for those who can't see it. */
  summary: string
}

/** With more bars than this there is no room for gaps; they are then drawn as one shape, which has no seams. */
const MOST_GAPS = 120
/** Between two bars, as a share of a bar's place. */
const GAP = 0.08
const angles = [0, 90, 180, 270, 360]

/** One bar for each bin, round the worm. The words stay at their size however wide the picture is. */
export function BinPicture({ values, axisTitle, summary }: BinPictureProps) {
  const { bars, zeroTop, ticks } = binBars(values)
  const decimals = decimalsFor(ticks.map(({ value }) => value))
  return (
    <figure role="img" aria-label={summary} className="figures text-xs text-soft">
      <p className="mb-2 pl-12 text-left" aria-hidden="true">
        {axisTitle}
      </p>
      <div className="flex" aria-hidden="true">
        <div className="relative h-56 w-12 shrink-0">
          {ticks.map(({ top, value }) => (
            <span key={value} className="absolute right-2 -translate-y-1/2" style={{ top: `${100 * top}%` }}>
              {formatNumber(value, decimals, { isSigned: true })}
            </span>
          ))}
        </div>
        <svg viewBox="0 0 1 1" preserveAspectRatio="none" className="h-56 min-w-0 flex-1">
          {ticks.map(({ top, value }) => (
            <line
              key={value}
              x1="0"
              x2="1"
              y1={top}
              y2={top}
              className="stroke-faint"
              vectorEffect="non-scaling-stroke"
            />
          ))}
          {values.length > MOST_GAPS ? (
            <path d={outline(bars, zeroTop)} className="fill-brass-fill" />
          ) : (
            bars.map(({ left, width, top, height }, index) => (
              <rect
                key={index}
                x={left + (GAP / 2) * width}
                width={width * (1 - GAP)}
                y={top}
                height={height}
                className="fill-brass-fill"
              />
            ))
          )}
          <line x1="0" x2="1" y1={zeroTop} y2={zeroTop} className="stroke-soft" vectorEffect="non-scaling-stroke" />
        </svg>
      </div>
      <div className="relative ml-12 h-5 border-t border-rule" aria-hidden="true">
        {angles.map((angle) => (
          <span
            key={angle}
            className="absolute top-1 -translate-x-1/2 first:translate-x-0 last:-translate-x-full"
            style={{ left: `${angle / 3.6}%` }}
          >
            {angle}°
          </span>
        ))}
      </div>
      <p className="mt-1 text-right" aria-hidden="true">
        worm angle
      </p>
    </figure>
  )
}

function outline(bars: BinBars['bars'], zeroTop: number): string {
  const steps = bars.map(
    ({ left, width, top, height, isNegative }) => `V${isNegative ? top + height : top}H${left + width}`,
  )
  return `M0 ${zeroTop}${steps.join('')}V${zeroTop}Z`
}

function decimalsFor(ticks: readonly number[]): number {
  const step = ticks.length > 1 ? Math.abs(ticks[1] - ticks[0]) : 1
  return step > 0 ? Math.min(6, Math.max(0, -Math.floor(Math.log10(step) + 1e-9))) : 0
}
