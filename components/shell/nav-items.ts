export interface NavItem {
  href: string
  label: string
}

/** Pages beside the projects that no project’s id can be. */
const NO_PROJECTS = ['new', 'import']

/** The project an address lies in; `/projects/new` is none. */
export function projectIdIn(pathname: string): string | null {
  const id = /^\/projects\/([^/]+)/.exec(pathname)?.[1]
  return id && !NO_PROJECTS.includes(id) ? id : null
}

export function navItems(pathname: string, isSignedIn: boolean): NavItem[] {
  const projectId = projectIdIn(pathname)
  if (projectId) {
    const base = `/projects/${projectId}`
    return [
      { href: base, label: 'Overview' },
      { href: `${base}/runs`, label: 'Runs' },
      { href: `${base}/analyses`, label: 'Analyses' },
      { href: `${base}/corrections`, label: 'Corrections' },
      { href: `${base}/drive`, label: 'Drive train' },
      { href: `${base}/people`, label: 'People' },
      { href: `${base}/settings`, label: 'Settings' },
    ]
  }
  const bench = { href: '/bench', label: 'Bench' }
  return isSignedIn ? [{ href: '/projects', label: 'Projects' }, bench] : [bench]
}

/** The item whose address the pathname lies under, the longest first, so that Overview gives way to the others. */
export function currentHref(pathname: string, items: readonly NavItem[]): string | undefined {
  return items
    .map((item) => item.href)
    .filter((href) => pathname === href || pathname.startsWith(`${href}/`))
    .sort((a, b) => b.length - a.length)[0]
}
