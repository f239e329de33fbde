export const themes = ['day', 'dusk', 'night'] as const
export type Theme = (typeof themes)[number]

/** The cookie that holds the choice; rendered as data-theme on <html>, so that no script decides it late. */
export const themeCookieName = 'theme'

export function isTheme(value: unknown): value is Theme {
  return themes.some((theme) => theme === value)
}
