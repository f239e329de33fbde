'use client'

import { Segmented } from '@/components/ui/segmented'
import { chooseTheme, keepThemeWithAccount, useTheme } from '@/lib/client/theme'
import type { Theme } from '@/lib/client/theme-names'

const options = [
  { value: 'day', label: 'Day' },
  { value: 'dusk', label: 'Dusk' },
  { value: 'night', label: 'Night' },
] as const

export function ThemeSwitch({ serverTheme, isSignedIn }: { serverTheme?: Theme; isSignedIn: boolean }) {
  const theme = useTheme(serverTheme)
  function choose(chosen: Theme) {
    chooseTheme(chosen)
    if (isSignedIn) keepThemeWithAccount(chosen)
  }
  return <Segmented<Theme> label="Theme" value={theme} options={options} onValue={choose} />
}
