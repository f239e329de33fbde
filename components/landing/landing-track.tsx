import type { LandingTrack } from '@/lib/figures/landing-picture'
import { PictureText } from './picture-text'

/** The recorded star, the fit over it, the drift below both; turns of the worm along the top. */
export function LandingTrackDrawing({ track, className }: { track: LandingTrack; className: string }) {
  const { plot, width, height } = track
  return (
    <svg
      viewBox={`0 0 ${width} ${height}`}
      className={`block h-auto w-full ${className}`}
      aria-hidden="true"
      focusable="false"
    >
      {track.valueTicks.map(({ at, label }) => (
        <g key={label}>
          <line x1={plot.left} x2={plot.right} y1={at} y2={at} className="stroke-faint" />
          <PictureText x={plot.left - 8} y={at + 4} anchor="end">
            {label}
          </PictureText>
        </g>
      ))}
      {track.gaps.map((gap) => (
        <rect
          key={gap.x}
          x={gap.x}
          y={plot.top}
          width={gap.width}
          height={plot.bottom - plot.top}
          className="fill-steel opacity-20"
        />
      ))}
      {track.turns.map(({ x, width: turnWidth, label }, i) => (
        <g key={label}>
          {i === 0 ? null : (
            <line x1={x} x2={x} y1={plot.top} y2={plot.bottom} strokeDasharray="2 4" className="stroke-rule" />
          )}
          {turnWidth > (i % 2 === 0 ? 40 : 60) ? (
            <PictureText x={x + turnWidth / 2} y={plot.top - 10} anchor="middle">
              {label}
            </PictureText>
          ) : null}
        </g>
      ))}
      <path
        vectorEffect="non-scaling-stroke"
        d={track.recordedPath}
        fill="none"
        strokeWidth="1.2"
        strokeLinejoin="round"
        className="stroke-steel"
      />
      <path
        vectorEffect="non-scaling-stroke"
        d={track.driftPath}
        fill="none"
        strokeWidth="1.6"
        strokeDasharray="6 4"
        className="stroke-verdigris"
      />
      <path
        vectorEffect="non-scaling-stroke"
        d={track.fittedPath}
        fill="none"
        strokeWidth="2.2"
        strokeLinejoin="round"
        className="stroke-brass"
      />
      {track.strayPoints.map(({ x, y }) => (
        <path
          key={x}
          d={`M${x - 4} ${y - 4}l8 8m0 -8l-8 8`}
          fill="none"
          strokeWidth="1.6"
          strokeLinecap="round"
          className="stroke-oxide"
        />
      ))}
      <PictureText x={0} y={18} anchor="start">
        arcsec on the axis, ahead is up
      </PictureText>
      <line x1={plot.left} x2={plot.right} y1={plot.bottom} y2={plot.bottom} className="stroke-soft" />
      {track.timeTicks.map(({ at, label }) => (
        <g key={label}>
          <line x1={at} x2={at} y1={plot.bottom} y2={plot.bottom + 5} className="stroke-soft" />
          <PictureText x={at} y={plot.bottom + 20} anchor="middle">
            {label}
          </PictureText>
        </g>
      ))}
      <PictureText x={plot.right} y={height - 6} anchor="end">
        minutes into the run
      </PictureText>
    </svg>
  )
}
