import Link from 'next/link'
import type { ReactNode } from 'react'

export interface Crumb {
  label: string
  /** Left out for the page itself. */
  href?: string
}

interface PageHeadingProps {
  crumbs?: readonly Crumb[]
  /** The finding of the page, as a sentence. */
  title: ReactNode
  /** A sentence or two below it. */
  lead?: ReactNode
  actions?: ReactNode
}

export function PageHeading({ crumbs = [], title, lead, actions }: PageHeadingProps) {
  return (
    <div className="flex flex-wrap items-end justify-between gap-x-6 gap-y-3">
      <div className="max-w-[64rem] min-w-0">
        <Crumbs crumbs={crumbs} />
        <h1 className="text-title font-[640] text-balance wrap-anywhere">{title}</h1>
        {lead ? <p className="mt-1.5 max-w-[75ch] text-pretty text-soft">{lead}</p> : null}
      </div>
      {actions ? <div className="no-print flex flex-wrap gap-2">{actions}</div> : null}
    </div>
  )
}

/** The way to this page, from the project down. */
export function Crumbs({ crumbs }: { crumbs: readonly Crumb[] }) {
  if (crumbs.length === 0) return null
  return (
    <nav aria-label="Where you are" className="mb-1 text-sm text-soft">
      <ol className="flex flex-wrap gap-x-1.5">
        {crumbs.map((crumb, index) => (
          <li key={index} className="flex min-w-0 gap-x-1.5 wrap-anywhere">
            {index > 0 ? <span aria-hidden="true">/</span> : null}
            {crumb.href ? (
              <Link
                href={crumb.href}
                className="hover:text-ink hover:underline pointer-coarse:-my-3.25 pointer-coarse:py-3.25"
              >
                {crumb.label}
              </Link>
            ) : (
              <span aria-current="page">{crumb.label}</span>
            )}
          </li>
        ))}
      </ol>
    </nav>
  )
}
