'use client'

import Link from 'next/link'
import { usePathname } from 'next/navigation'
import { useEffect, useRef } from 'react'
import { classNames } from '@/components/ui/class-names'
import { currentHref, navItems } from './nav-items'

/** Inside a project its parts, elsewhere the ways in. On a phone the row scrolls, to where one is. */
export function SiteNav({ isSignedIn }: { isSignedIn: boolean }) {
  const pathname = usePathname()
  const items = navItems(pathname, isSignedIn)
  const current = currentHref(pathname, items)
  const nav = useRef<HTMLElement>(null)

  useEffect(() => {
    const row = nav.current
    const link = row?.querySelector<HTMLElement>('[aria-current]')
    if (row && link) row.scrollLeft = link.offsetLeft - row.offsetLeft - (row.clientWidth - link.offsetWidth) / 2
  }, [current])

  return (
    <nav
      ref={nav}
      aria-label="Main"
      className="-mx-1 flex min-w-0 overflow-x-auto px-1 max-md:order-last max-md:col-span-2"
    >
      <ul className="flex gap-5">
        {items.map(({ href, label }) => (
          <li key={href}>
            <Link
              href={href}
              aria-current={href === current ? 'page' : undefined}
              className={classNames(
                'block border-b-2 px-0.5 py-1 whitespace-nowrap -outline-offset-2 pointer-coarse:py-2.5',
                href === current
                  ? 'border-brass-fill font-semibold text-ink'
                  : 'border-transparent text-soft hover:text-ink',
              )}
            >
              {label}
            </Link>
          </li>
        ))}
      </ul>
    </nav>
  )
}
