import { sinc } from './sampling'
import { fraction } from './statistics'
import type { TableSettings } from './types'

/** What a device plays: node j stands at worm phase j/N from the table's origin, in arc seconds of axis. */
export interface PlayedTable {
  nodes: Float64Array
  playback: TableSettings['playback']
}

/**
 * Correction in arc seconds that the device applies at a worm phase (turns from the table's origin): straight lines
 * between nodes, or a stair that holds value j from node j to j + 1 ('held-from-start') or from half a bin before to
 * half a bin after node j ('held-at-centre').
 */
export function playAt({ nodes, playback }: PlayedTable, phaseTurns: number): number {
  const position = nodes.length * fraction(phaseTurns)
  const wrap = (j: number) => (j >= nodes.length ? j - nodes.length : j)
  if (playback === 'held-at-centre') return nodes[wrap(Math.floor(position + 0.5))]
  const j = wrap(Math.floor(position))
  if (playback === 'held-from-start') return nodes[j]
  const share = position - Math.floor(position)
  return nodes[j] * (1 - share) + nodes[wrap(j + 1)] * share
}

/**
 * Cosine and sine coefficient of one order in the played table, exactly: the nodes' own Fourier sum (which holds the
 * images of other orders) times sinc²(k/N) for straight lines, sinc(k/N) for a stair about its nodes, and that turned
 * by half a bin for a stair from its nodes.
 */
export function playedCoefficients(
  { nodes, playback }: PlayedTable,
  order: number,
): { cosArcsec: number; sinArcsec: number } {
  const count = nodes.length
  let cosSum = 0
  let sinSum = 0
  nodes.forEach((node, j) => {
    // j·k modulo N keeps the angle small and exact for high orders
    const angle = (2 * Math.PI * ((j * order) % count)) / count
    cosSum += node * Math.cos(angle)
    sinSum += node * Math.sin(angle)
  })
  const gain = playback === 'interpolated' ? sinc(order / count) ** 2 : sinc(order / count)
  const a = (2 * gain * cosSum) / count
  const b = (2 * gain * sinSum) / count
  const delay = playback === 'held-from-start' ? (Math.PI * order) / count : 0
  return {
    cosArcsec: a * Math.cos(delay) - b * Math.sin(delay),
    sinArcsec: a * Math.sin(delay) + b * Math.cos(delay),
  }
}

/** Mean square of the played correction over a turn: Σ(c_j² + c_j c_{j+1} + c_{j+1}²)/3N for straight lines. */
export function playedMeanSquare({ nodes, playback }: PlayedTable): number {
  let total = 0
  nodes.forEach((node, j) => {
    const next = nodes[j + 1 < nodes.length ? j + 1 : 0]
    total += playback === 'interpolated' ? (node * node + node * next + next * next) / 3 : node * node
  })
  return total / nodes.length
}
