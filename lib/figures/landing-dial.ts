import type { AnalysisViews } from '@/lib/analysis/types'
import { formatNumber } from '@/lib/units'
import { freestAngle } from './dial'
import { evenTicks, short, type Tick } from './svg-geometry'

/** Every turn on one worm angle, round a dial: 0° on top, clockwise, outward is ahead. */
export interface LandingDial {
  size: number
  centre: number
  rimRadius: number
  zeroRadius: number
  /** Circles of equal displacement; `at` is the radius. */
  rings: (Tick & { labelX: number; labelY: number })[]
  /** Short strokes on the rim every 10°, longer ones every 90°. */
  rimPath: string
  rimLabels: { x: number; y: number; label: string }[]
  turnPaths: string[]
  curvePath: string
}

const SIZE = 440
const CENTRE = SIZE / 2
const RIM_RADIUS = 178
/** The zero circle stands at this share of the rim's radius, the furthest point at the second one. */
const ZERO_SHARE = 0.52
const FURTHEST_SHARE = 0.93

export function landingDial(turn: NonNullable<AnalysisViews['turn']>): LandingDial {
  const every = [...turn.curveArcsec, ...turn.turns.flatMap(({ arcsec }) => [...arcsec])].filter(Number.isFinite)
  const furthest = Math.max(...every.map(Math.abs), Number.MIN_VALUE)
  const zeroRadius = ZERO_SHARE * RIM_RADIUS
  const pxPerArcsec = ((FURTHEST_SHARE - ZERO_SHARE) * RIM_RADIUS) / furthest
  const radius = (arcsec: number) => zeroRadius + arcsec * pxPerArcsec
  const ringStep = evenTicks(0, furthest, 2)[1] ?? furthest
  const rings = [-ringStep, ringStep]
  const labelAngle = freestAngle(turn, rings)
  return {
    size: SIZE,
    centre: CENTRE,
    rimRadius: RIM_RADIUS,
    zeroRadius,
    rings: rings.map((arcsec) => {
      const { x, y } = pointAt(labelAngle, radius(arcsec))
      return { at: radius(arcsec), label: formatNumber(arcsec, 0, { isSigned: true }), labelX: x, labelY: y }
    }),
    rimPath: rimStrokes(),
    rimLabels: [0, 90, 180, 270].map((degrees) => ({
      ...pointAt(degrees, RIM_RADIUS + 25),
      label: formatNumber(degrees, 0, { unit: '°' }),
    })),
    turnPaths: turn.turns.map(({ angleDegrees, arcsec }) => polarPath(angleDegrees, arcsec, radius)),
    curvePath: polarPath(turn.angleDegrees, turn.curveArcsec, radius, true),
  }
}

function pointAt(degrees: number, radius: number) {
  const angle = (degrees * Math.PI) / 180
  return { x: CENTRE + radius * Math.sin(angle), y: CENTRE - radius * Math.cos(angle) }
}

/** A closed curve runs on to its beginning. A gap, or the jump from 360° to 0°, breaks an open one. */
function polarPath(
  angleDegrees: ArrayLike<number>,
  arcsec: ArrayLike<number>,
  radius: (arcsec: number) => number,
  isClosed = false,
): string {
  let path = ''
  let previous: number | null = null
  for (let i = 0; i < angleDegrees.length; i++) {
    if (!Number.isFinite(arcsec[i])) {
      previous = null
      continue
    }
    const { x, y } = pointAt(angleDegrees[i], radius(arcsec[i]))
    const isNext = previous !== null && angleDegrees[i] >= previous
    path += `${isNext ? 'L' : 'M'}${short(x)} ${short(y)}`
    previous = angleDegrees[i]
  }
  return isClosed && path !== '' ? `${path}Z` : path
}

function rimStrokes(): string {
  let path = ''
  for (let degrees = 0; degrees < 360; degrees += 10) {
    const inner = pointAt(degrees, RIM_RADIUS)
    const outer = pointAt(degrees, RIM_RADIUS + (degrees % 90 === 0 ? 9 : 5))
    path += `M${short(inner.x)} ${short(inner.y)}L${short(outer.x)} ${short(outer.y)}`
  }
  return path
}
