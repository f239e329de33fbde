import { z } from 'zod'

export const themeNameSchema = z.enum(['day', 'dusk', 'night'])
export type ThemeName = z.infer<typeof themeNameSchema>

/** How the size of a swing is told: from its middle, or from one end to the other. */
export const swingMeasureSchema = z.enum(['amplitude', 'peak-to-peak'])
export type SwingMeasure = z.infer<typeof swingMeasureSchema>

/** Pixels only where the run's image scale is known; arc seconds of the axis everywhere else. */
export const displacementUnitSchema = z.enum(['arcsec', 'px'])
export type DisplacementUnit = z.infer<typeof displacementUnitSchema>

function isTimeZone(name: string): boolean {
  try {
    new Intl.DateTimeFormat('en', { timeZone: name })
    return true
  } catch {
    return false
  }
}

/** An IANA name. */
export const timeZoneSchema = z
  .string()
  .min(1)
  .max(64)
  .refine(isTimeZone, { error: 'There is no time zone of this name' })

/** How one person wants to see things; what is computed and saved never depends on it. */
export const preferencesSchema = z.object({
  /** Null: as the system is set. */
  theme: themeNameSchema.nullable(),
  swingMeasure: swingMeasureSchema,
  displacementUnit: displacementUnitSchema,
  /** Null: the browser's own. */
  timeZone: timeZoneSchema.nullable(),
})
/** PATCH /api/account/preferences: what is to change; the rest stays. → 200 preferencesSchema. */
export const preferencesChangeSchema = preferencesSchema
  .partial()
  .refine((change) => Object.keys(change).length > 0, { error: 'Say what is to be changed' })
export type PreferencesChange = z.infer<typeof preferencesChangeSchema>

/** The cookie that holds the theme of this browser, and how long it is kept. */
export const THEME_COOKIE = { name: 'theme', maxAgeSeconds: 365 * 24 * 3600 }

export type Preferences = z.infer<typeof preferencesSchema>

export const DEFAULT_PREFERENCES: Preferences = {
  theme: null,
  swingMeasure: 'amplitude',
  displacementUnit: 'arcsec',
  timeZone: null,
}
