import type { PlotBox } from './svg-geometry'

/** A stem of the landing page's spectrum that wants a label near its dot. */
export interface LabelledStem {
  x: number
  y: number
  label: string
}

export interface LabelPlace {
  labelX: number
  labelY: number
  anchor: 'start' | 'middle' | 'end'
}

const CHARACTER_WIDTH = 7.4
const LETTER_HEIGHT = 12
const DOT_RADIUS = 5

/**
 * Places for the labels of stems, taller stems first: above the dot, beside it, or above to one side, whichever is the
 * first that meets no other stem, dot or label; above the dot when all of them do.
 */
export function placeStemLabels(stems: LabelledStem[], plot: PlotBox): LabelPlace[] {
  const places = new Map<LabelledStem, LabelPlace>()
  const taken: PlotBox[] = stems.map(({ x, y }) => ({
    left: x - DOT_RADIUS,
    right: x + DOT_RADIUS,
    top: y - DOT_RADIUS,
    bottom: plot.bottom,
  }))
  for (const stem of [...stems].sort((a, b) => a.y - b.y)) {
    const own = stems.indexOf(stem)
    const others = taken.filter((_, i) => i !== own)
    const candidates = candidatePlaces(stem)
    const fits = (place: LabelPlace) => {
      const box = labelBox(stem.label, place)
      return box.left >= plot.left && box.right <= plot.right && !others.some((other) => meets(box, other))
    }
    const place = candidates.find(fits) ?? candidates[0]
    places.set(stem, place)
    taken.push(labelBox(stem.label, place))
  }
  return stems.map((stem) => places.get(stem)!)
}

function candidatePlaces({ x, y }: LabelledStem): LabelPlace[] {
  return [
    { labelX: x, labelY: y - 10, anchor: 'middle' },
    { labelX: x + 9, labelY: y + 4, anchor: 'start' },
    { labelX: x - 9, labelY: y + 4, anchor: 'end' },
    { labelX: x - 5, labelY: y - 10, anchor: 'start' },
    { labelX: x + 5, labelY: y - 10, anchor: 'end' },
    { labelX: x - 5, labelY: y - 24, anchor: 'start' },
  ]
}

function labelBox(label: string, { labelX, labelY, anchor }: LabelPlace): PlotBox {
  const width = label.length * CHARACTER_WIDTH
  const left = labelX - { start: 0, middle: width / 2, end: width }[anchor]
  return { left, right: left + width, top: labelY - LETTER_HEIGHT, bottom: labelY + 2 }
}

function meets(a: PlotBox, b: PlotBox): boolean {
  return a.left < b.right && b.left < a.right && a.top < b.bottom && b.top < a.bottom
}
