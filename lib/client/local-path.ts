/**
 * The address to go on to after signing in: only a path of this site, so that a link can't send people elsewhere.
 * Browsers read `//host` and `/\host` as another site, and drop tabs and line breaks before they look.
 */
export function localPath(next: unknown, fallback = '/projects'): string {
  if (typeof next !== 'string' || !/^\/(?![/\\])[\x21-\x7e]*$/.test(next)) return fallback
  const url = new URL(next, 'http://local.invalid')
  // `/..//host` is local as typed and `//host` once its dots are resolved.
  if (url.origin !== 'http://local.invalid' || url.pathname.startsWith('//')) return fallback
  return `${url.pathname}${url.search}${url.hash}`
}
