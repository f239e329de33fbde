import { THEME_COOKIE, themeNameSchema, type ThemeName } from '@/lib/schemas/preferences'

export const themes = themeNameSchema.options
export type Theme = ThemeName

/** The cookie that holds the choice; rendered as data-theme on <html>, so that no script decides it late. */
export const themeCookieName = THEME_COOKIE.name

export function isTheme(value: unknown): value is Theme {
  return themes.some((theme) => theme === value)
}
