export interface LabelPoint {
  xPx: number
  yPx: number
  text: string
}

export interface PlacedLabel extends LabelPoint {
  /** Where the text stands: over the point, or at its right or left. */
  anchor: 'over' | 'right' | 'left'
  /** Pixels upwards from the place that the anchor gives; downwards if negative. */
  liftPx: number
}

const CHARACTER_PX = 7.2
const HEIGHT_PX = 16

export interface Box {
  left: number
  right: number
  top: number
  bottom: number
}

/**
 * Sets labels beside points so that none covers another label or a point: over the point first, then right and left, then
 * moved up or down step by step. A label that finds no free place within eight steps is left out; the picture's table still names it.
 *
 * @param points in the order of their importance; pixels count from the upper left corner
 * @param room.blocked places that other writing takes
 * @param room.floorPx where the stems below the points end, if there are any; a label stands across one only for want of another place
 */
export function placeLabels(
  points: readonly LabelPoint[],
  { widthPx, blocked = [], floorPx }: { widthPx: number; blocked?: readonly Box[]; floorPx?: number },
): PlacedLabel[] {
  const dots = points.map(({ xPx, yPx }) => ({ left: xPx - 5, right: xPx + 5, top: yPx - 5, bottom: yPx + 5 }))
  const stems = points.flatMap(({ xPx, yPx }) =>
    floorPx === undefined ? [] : [{ left: xPx - 1, right: xPx + 1, top: yPx, bottom: floorPx }],
  )
  const taken: Box[] = [...blocked, ...dots]
  const placed: PlacedLabel[] = []
  for (const point of points) {
    const free = candidates(point).filter((candidate) => {
      const box = boxOf(candidate)
      const isInside = box.left >= 0 && box.right <= widthPx && box.top >= 0
      return isInside && taken.every((other) => !overlap(box, other))
    })
    const found = free.find((candidate) => stems.every((stem) => !overlap(boxOf(candidate), stem))) ?? free.at(0)
    if (!found) continue
    placed.push(found)
    taken.push(boxOf(found))
  }
  return placed
}

function candidates(point: LabelPoint): PlacedLabel[] {
  const lifts = Array.from({ length: 8 }, (_, step) => step * 9).flatMap((liftPx) => [liftPx, -liftPx])
  return lifts.flatMap((liftPx) =>
    (['over', 'right', 'left'] as const)
      .filter((anchor) => anchor !== 'over' || liftPx >= 0)
      .map((anchor) => ({ ...point, anchor, liftPx: liftPx + 0 })),
  )
}

function boxOf({ xPx, yPx, text, anchor, liftPx }: PlacedLabel): Box {
  const width = text.length * CHARACTER_PX
  const left = anchor === 'over' ? xPx - width / 2 : anchor === 'right' ? xPx + 9 : xPx - 9 - width
  const bottom = (anchor === 'over' ? yPx - 7 : yPx + HEIGHT_PX / 2 - 4) - liftPx
  return { left, right: left + width, top: bottom - HEIGHT_PX, bottom }
}

function overlap(a: Box, b: Box): boolean {
  return a.left < b.right && b.left < a.right && a.top < b.bottom && b.top < a.bottom
}
