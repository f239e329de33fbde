/** How a note is drawn in our own pictures: solid while it is open, dashed once it is settled. */
export function markStroke(isSettled: boolean): { strokeWidth: number; strokeDasharray?: string } {
  return isSettled ? { strokeWidth: 1, strokeDasharray: '2.5 2' } : { strokeWidth: 1.5 }
}
