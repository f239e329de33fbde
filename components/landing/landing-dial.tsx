import type { LandingDial } from '@/lib/figures/landing-dial'
import { PictureText } from './picture-text'

/** Every turn laid over the others, once round the worm: outward is ahead, inward behind. */
export function LandingDialDrawing({ dial }: { dial: LandingDial }) {
  const { size, centre } = dial
  return (
    <svg
      viewBox={`0 0 ${size} ${size}`}
      className="mx-auto block h-auto w-full max-w-[30rem]"
      aria-hidden="true"
      focusable="false"
    >
      <path d={dial.rimPath} fill="none" vectorEffect="non-scaling-stroke" strokeWidth="1.2" className="stroke-soft" />
      <circle cx={centre} cy={centre} r={dial.rimRadius} fill="none" className="stroke-rule" />
      {dial.rings.map(({ at, label }) => (
        <circle key={label} cx={centre} cy={centre} r={at} fill="none" className="stroke-faint" />
      ))}
      <circle cx={centre} cy={centre} r={dial.zeroRadius} fill="none" strokeDasharray="2 4" className="stroke-soft" />
      {dial.turnPaths.map((path, i) => (
        <path key={i} d={path} fill="none" strokeLinejoin="round" className="stroke-steel opacity-60" />
      ))}
      <path
        d={dial.curvePath}
        fill="none"
        vectorEffect="non-scaling-stroke"
        strokeWidth="3"
        strokeLinejoin="round"
        className="stroke-brass"
      />
      {dial.rings.map(({ label, labelX, labelY }) => (
        <PictureText key={label} x={labelX} y={labelY + 4} anchor="middle" isSquare>
          {label}
        </PictureText>
      ))}
      {dial.rimLabels.map(({ x, y, label }) => (
        <PictureText key={label} x={x} y={y + 4} anchor="middle" isSquare>
          {label}
        </PictureText>
      ))}
    </svg>
  )
}
