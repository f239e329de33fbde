import 'server-only'
import { THEME_COOKIE, type ThemeName } from '@/lib/schemas/preferences'

/**
 * The Set-Cookie header that brings the account’s theme into the browser that signs in; null where the account has none,
 * so that the browser keeps its own. Scripts read and write it (lib/client/theme.ts): it holds nothing secret.
 */
export function themeCookie(theme: ThemeName | null): string | null {
  if (theme === null) return null
  return `${THEME_COOKIE.name}=${theme}; Path=/; Max-Age=${THEME_COOKIE.maxAgeSeconds}; SameSite=Lax`
}
