'use client'

import { useEffect, useState, type RefObject } from 'react'

/** Width of an element in whole pixels, followed as it changes; 0 before it is known. */
export function useWidth(element: RefObject<HTMLElement | null>): number {
  const [width, setWidth] = useState(0)
  useEffect(() => {
    const target = element.current
    if (!target) return
    const measure = () => setWidth(Math.floor(target.getBoundingClientRect().width))
    measure()
    const observer = new ResizeObserver(measure)
    observer.observe(target)
    return () => observer.disconnect()
  }, [element])
  return width
}
