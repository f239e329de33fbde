import type { LandingStems } from '@/lib/figures/landing-stems'
import { PictureText } from './picture-text'

/** The swings that were found, as stems with a dot over the spectrum of what they leave. */
export function LandingStemsDrawing({ stems, className }: { stems: LandingStems; className: string }) {
  const { plot, width, height } = stems
  return (
    <svg
      viewBox={`0 0 ${width} ${height}`}
      className={`block h-auto w-full ${className}`}
      aria-hidden="true"
      focusable="false"
    >
      {stems.amplitudeTicks.map(({ at, label }) => (
        <g key={label}>
          <line x1={plot.left} x2={plot.right} y1={at} y2={at} className="stroke-faint" />
          <PictureText x={plot.left - 8} y={at + 4} anchor="end">
            {label}
          </PictureText>
        </g>
      ))}
      <PictureText x={plot.right} y={plot.top} anchor="end">
        arcsec amplitude
      </PictureText>
      <path
        vectorEffect="non-scaling-stroke"
        d={stems.leftOverPath}
        strokeLinejoin="round"
        className="fill-faint stroke-steel"
      />
      <line x1={plot.left} x2={plot.right} y1={28} y2={28} className="stroke-rule" />
      <PictureText x={plot.left - 8} y={21} anchor="end">
        order
      </PictureText>
      {stems.orderTicks.map(({ at, label }) => (
        <g key={label}>
          <line x1={at} x2={at} y1={28} y2={34} className="stroke-soft" />
          <PictureText x={at} y={21} anchor="middle">
            {label}
          </PictureText>
        </g>
      ))}
      {stems.stems.map(({ x, y, label, labelX, labelY, anchor, kind }) => (
        <g key={label} className={kind === 'worm' ? 'fill-brass-fill stroke-brass' : 'fill-verdigris stroke-verdigris'}>
          <line x1={x} x2={x} y1={plot.bottom} y2={y} strokeWidth="2" />
          <circle cx={x} cy={y} r="4.5" stroke="none" />
          <text
            x={labelX}
            y={labelY}
            textAnchor={anchor}
            stroke="none"
            className={`text-[13px] font-semibold ${kind === 'worm' ? 'fill-brass' : 'fill-verdigris'}`}
          >
            {label}
          </text>
        </g>
      ))}
      <line x1={plot.left} x2={plot.right} y1={plot.bottom} y2={plot.bottom} className="stroke-soft" />
      {stems.periodTicks.map(({ at, label }) => (
        <g key={label}>
          <line x1={at} x2={at} y1={plot.bottom} y2={plot.bottom + 5} className="stroke-soft" />
          <PictureText x={at} y={plot.bottom + 20} anchor="middle">
            {label}
          </PictureText>
        </g>
      ))}
      <PictureText x={plot.right} y={height - 4} anchor="end">
        period of the swing
      </PictureText>
    </svg>
  )
}
