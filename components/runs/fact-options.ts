import type { SelectOption } from '@/components/ui/select'
import type { RunFacts } from '@/lib/schemas/run-facts'

type Options<Fact extends keyof RunFacts> = readonly (SelectOption & { value: RunFacts[Fact] })[]

/** How each fact that is chosen from a list reads on the screens. */
export const GUIDING_OPTIONS: Options<'guiding'> = [
  { value: 'unknown', label: 'not known' },
  { value: 'off', label: 'off' },
  { value: 'logged', label: 'on, with its corrections logged' },
]
export const SIDE_OF_PIER_OPTIONS: Options<'sideOfPier'> = [
  { value: 'unknown', label: 'not known' },
  { value: 'east', label: 'east' },
  { value: 'west', label: 'west' },
]
export const TRACKING_RATE_OPTIONS: Options<'trackingRate'> = [
  { value: 'unknown', label: 'not known' },
  { value: 'sidereal', label: 'sidereal' },
  { value: 'solar', label: 'solar' },
  { value: 'lunar', label: 'lunar' },
]
export const MOUNT_CORRECTION_OPTIONS: Options<'mountCorrection'> = [
  { value: 'unknown', label: 'not known' },
  { value: 'off', label: 'off' },
  { value: 'on', label: 'on: a table was playing' },
]
