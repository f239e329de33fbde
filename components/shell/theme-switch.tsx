'use client'

import { Segmented } from '@/components/ui/segmented'
import { chooseTheme, useTheme } from '@/lib/client/theme'
import type { Theme } from '@/lib/client/theme-names'

const options = [
  { value: 'day', label: 'Day' },
  { value: 'dusk', label: 'Dusk' },
  { value: 'night', label: 'Night' },
] as const

export function ThemeSwitch({ serverTheme }: { serverTheme?: Theme }) {
  const theme = useTheme(serverTheme)
  return <Segmented<Theme> label="Theme" value={theme} options={options} onValue={chooseTheme} />
}
