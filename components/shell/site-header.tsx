import Link from 'next/link'
import type { Theme } from '@/lib/client/theme-names'
import { Mark } from './mark'
import { OutsideReports } from './outside-reports'
import { SiteNav } from './site-nav'
import { ThemeSwitch } from './theme-switch'

interface SiteHeaderProps {
  user: { displayName: string } | null
  serverTheme?: Theme
}

export function SiteHeader({ user, serverTheme }: SiteHeaderProps) {
  return (
    <header className="no-print border-b border-rule bg-card">
      <div className="mx-auto grid max-w-[1680px] grid-cols-[auto_minmax(0,1fr)] items-center gap-x-7 gap-y-2 px-8 py-2.5 max-sm:gap-x-2 max-sm:px-4 md:flex">
        <Link
          href="/"
          className="flex items-center gap-2.5 rounded-control text-finding font-semibold pointer-coarse:min-h-11"
        >
          <Mark className="size-7" />
          Turnwright
        </Link>
        <OutsideReports>
          <SiteNav isSignedIn={user !== null} />
        </OutsideReports>
        <div className="ml-auto flex min-w-0 items-center gap-4 max-sm:gap-2">
          <ThemeSwitch serverTheme={serverTheme} isSignedIn={user !== null} />
          <OutsideReports>
            {user ? (
              <Link
                href="/account"
                className="max-w-40 min-w-0 truncate text-soft hover:text-ink pointer-coarse:py-3"
                title="Your account"
              >
                {user.displayName}
              </Link>
            ) : (
              <Link href="/sign-in" className="whitespace-nowrap text-soft hover:text-ink pointer-coarse:py-3">
                Sign in
              </Link>
            )}
          </OutsideReports>
        </div>
      </div>
    </header>
  )
}
