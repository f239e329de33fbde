'use client'

import type { HarmonicResult } from '@/lib/analysis/types'
import {
  displacementUnitOf,
  displacementFactor,
  displacementUnitWord,
  formatSwing,
  PLAIN_DISPLAY,
  swingColumn,
  swingFactor,
  type Display,
} from '@/lib/display-units'
import { errorEllipse } from '@/lib/figures/error-ellipse'
import { harmonicName } from '@/lib/findings/words'
import { formatEstimate, formatNumber } from '@/lib/units'
import { SvgPicture } from './svg-picture'

/** Sizes of one picture; two abreast, on a phone, it is drawn smaller so that its letters keep their size. */
const WIDE = { cell: 216, height: 262, rim: 76, reach: 96 }
const SMALL = { cell: 172, height: 232, rim: 62, reach: 80 }
const COLUMNS = 4

/** One small picture a harmonic: size and phase as a dot, and the ellipse in which 95 of 100 repeats would fall. */
export function PhasorChart({
  harmonics,
  summary,
  columns = COLUMNS,
  display = PLAIN_DISPLAY,
}: {
  harmonics: readonly HarmonicResult[]
  summary: string
  columns?: number
  display?: Display
}) {
  const [swing, displacement] = [swingFactor(display), displacementFactor(display)]
  const unit = displacementUnitWord(display)
  const across = Math.min(columns, Math.max(1, harmonics.length))
  const size = columns < COLUMNS ? SMALL : WIDE
  const down = Math.ceil(harmonics.length / across)
  return (
    <SvgPicture
      name="harmonics"
      summary={summary}
      width={across * size.cell}
      height={down * size.height}
      className="mx-auto block h-auto w-full"
      table={{
        columns: [
          { name: 'order', values: harmonics.map(({ order }) => order) },
          {
            name: swingColumn(display),
            values: harmonics.map(({ amplitudeArcsec }) => swing * amplitudeArcsec.value),
          },
          {
            name: swingColumn(display, 'stderr'),
            values: harmonics.map(({ amplitudeArcsec }) => swing * (amplitudeArcsec.stderr ?? NaN)),
          },
          { name: 'phase_degrees', values: harmonics.map(({ phaseDegrees }) => phaseDegrees.value) },
          { name: 'phase_stderr_degrees', values: harmonics.map(({ phaseDegrees }) => phaseDegrees.stderr ?? NaN) },
          // Coefficients of cos and sin are what they are; only their unit is that of the display.
          { name: `cos_${unit}`, values: harmonics.map(({ cosArcsec }) => displacement * cosArcsec) },
          { name: `sin_${unit}`, values: harmonics.map(({ sinArcsec }) => displacement * sinArcsec) },
        ],
      }}
    >
      {harmonics.map((harmonic, index) => (
        <g
          key={harmonic.order}
          transform={`translate(${((index % across) + 0.5) * size.cell} ${Math.floor(index / across) * size.height + size.rim + 30})`}
        >
          <Phasor harmonic={harmonic} size={size} display={display} />
        </g>
      ))}
    </SvgPicture>
  )
}

function Phasor({ harmonic, size, display }: { harmonic: HarmonicResult; size: typeof WIDE; display: Display }) {
  const { cell, height, rim, reach } = size
  const { order, cosArcsec, sinArcsec, covarianceArcsec2, amplitudeArcsec, phaseDegrees, isPhaseMeaningful } = harmonic
  const amplitude = Math.hypot(cosArcsec, sinArcsec)
  const ellipse = errorEllipse(covarianceArcsec2)
  // The dot lies on the rim, unless the ellipse would leave the picture.
  const rimArcsec = Math.max(amplitude, ellipse.major * 0.72, 1e-9)
  const scale = rim / rimArcsec
  const x = cosArcsec * scale
  const y = -sinArcsec * scale
  return (
    <>
      <title>
        {`${harmonicName(order)}: ${formatSwing(amplitudeArcsec, display)}, ${isPhaseMeaningful ? `at ${formatEstimate(phaseDegrees, { unit: '°' })}` : 'phase unknown'}`}
      </title>
      <rect x={-cell / 2} y={-rim - 28} width={cell} height={height} className="fill-transparent" />
      <circle r={rim} fill="none" className="stroke-faint" />
      <circle r={rim / 2} fill="none" className="stroke-faint" />
      <path d={`M${-reach} 0H${reach}M0 ${-reach}V${reach}`} className="stroke-soft" strokeDasharray="2 3" />
      <ellipse
        rx={Math.max(ellipse.major * scale, 1)}
        ry={Math.max(ellipse.minor * scale, 1)}
        transform={`translate(${x} ${y}) rotate(${-ellipse.angleDegrees})`}
        className="fill-brass-fill opacity-40"
      />
      <line
        x1="0"
        y1="0"
        x2={x}
        y2={y}
        className={isPhaseMeaningful ? 'stroke-brass' : 'stroke-steel'}
        strokeWidth="1.75"
        strokeDasharray={isPhaseMeaningful ? undefined : '4 3'}
      />
      <circle
        cx={x}
        cy={y}
        r="4"
        className={isPhaseMeaningful ? 'fill-brass' : 'fill-card stroke-steel'}
        strokeWidth="1.5"
      />
      <text
        y={reach + 24}
        textAnchor="middle"
        fontSize="13"
        fontWeight="600"
        className={isPhaseMeaningful ? 'fill-brass' : 'fill-soft'}
      >
        {harmonicName(order)}
      </text>
      <text y={reach + 43} textAnchor="middle" fontSize="12.5" className="figures fill-soft">
        {isPhaseMeaningful ? `rim ${rimText(rimArcsec, display)}` : 'not certain'}
      </text>
    </>
  )
}

/** What the outer circle stands for, as swings are measured. */
function rimText(rimArcsec: number, display: Display): string {
  const rim = rimArcsec * swingFactor(display)
  return formatNumber(rim, rim < 0.1 ? 3 : 2, { unit: displacementUnitOf(display) })
}
