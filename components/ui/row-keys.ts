import type { KeyboardEvent } from 'react'

const stepOf: Record<string, (index: number, last: number) => number> = {
  ArrowDown: (index, last) => Math.min(index + 1, last),
  ArrowUp: (index) => Math.max(index - 1, 0),
  Home: () => 0,
  End: (_, last) => last,
}

/** The link in the head of each row. */
export function rowLinks(body: HTMLElement): HTMLAnchorElement[] {
  return [...body.querySelectorAll<HTMLAnchorElement>('th[scope=row] a')]
}

/** Arrow keys, Home and End go from one row's link to another's. */
export function moveBetweenRows(event: KeyboardEvent<HTMLTableSectionElement>) {
  const step = stepOf[event.key]
  if (!step || !(event.target instanceof HTMLAnchorElement)) return
  const links = rowLinks(event.currentTarget)
  const index = links.indexOf(event.target)
  if (index < 0) return
  event.preventDefault()
  links[step(index, links.length - 1)].focus()
}
