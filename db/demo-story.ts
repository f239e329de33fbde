import type { AnalysisResult, Recipe } from '@/lib/analysis/types'
import type { newNoteSchema } from '@/lib/schemas/api'
import type { DemoPersonKey, DemoRun } from '@/lib/simulate/demo'
import { HILLSIDE_BELT_ORDER } from '@/lib/simulate/hillside'
import { defaultRecipe } from '@/lib/schemas/recipe'
import { DEMO_DRIVE_TRAIN } from '@/lib/simulate/demo'
import type { z } from 'zod'

type Anchor = z.infer<typeof newNoteSchema>['anchor']

interface DemoNote {
  runKey: string
  author: DemoRun['recordedBy']
  text: string
  /** Null: the figure that the note is pinned to is not in this result, so the note is left out. */
  anchor: (result: AnalysisResult) => Anchor | null
  /** Whom the text names; nobody is sent a mail about it. */
  mentions?: DemoPersonKey[]
  settledBy?: DemoRun['recordedBy']
}

/** What the club wrote beside its analyses. */
export const DEMO_NOTES: DemoNote[] = [
  {
    runKey: '2026-09-26',
    author: 'mira',
    text: 'The polar axis was well off this night: look at the worm, not at the span of the raw track.',
    anchor: () => ({ kind: 'whole' }),
  },
  {
    runKey: '2026-10-24',
    author: 'tomas',
    text: 'Nobody wrote down whether guiding was on. Don’t make a table of this one.',
    anchor: () => ({ kind: 'whole' }),
  },
  {
    runKey: '2026-11-14',
    author: 'mira',
    text: 'A cloud took the star for a minute.',
    anchor: () => ({ kind: 'time', timeSeconds: 1488 }),
  },
  {
    runKey: '2026-11-14',
    author: 'tomas',
    text: 'This is the belt: 90 teeth, 60 on the worm’s pulley, two swings in three turns. A table can’t take it out.',
    anchor: ({ worm }) =>
      worm && { kind: 'period', periodSeconds: Math.round((10 * worm.periodSeconds.value) / HILLSIDE_BELT_ORDER) / 10 },
  },
  {
    runKey: '2026-11-14',
    author: 'mira',
    text: 'Furthest ahead here. The steep part follows; no long exposures across it without guiding.',
    anchor: ({ worm }) => worm && { kind: 'worm-angle', angleDegrees: Math.round(worm.furthestAheadDegrees) % 360 },
  },
  {
    runKey: '2026-11-14',
    author: 'mira',
    text: 'The worm’s second harmonic stands out. Ease the mesh a little before the next run.',
    anchor: () => ({ kind: 'whole' }),
    settledBy: 'tomas',
  },
  {
    runKey: '2026-11-21',
    author: 'tomas',
    text: 'First run since 16 November: eccentric eased by a quarter turn, both grub screws re-seated.',
    anchor: () => ({ kind: 'whole' }),
  },
  {
    runKey: '2026-11-21',
    author: 'mira',
    text: '@Tomas Lindqvist, make the table from this one. Keep a copy of what is in the mount first.',
    anchor: () => ({ kind: 'whole' }),
    mentions: ['tomas'],
  },
]

/** The correction table that the club plays now. */
export const DEMO_CORRECTION = { runKey: '2026-11-21', author: 'tomas', name: 'Mesh eased, 240 bins' } as const

/** The settings of a demo run's analysis: the bench's own, with the gear's period where the run is too short to free it. */
export function demoRecipe(run: DemoRun): Recipe {
  const base = defaultRecipe()
  const turns = run.truth.options.durationSeconds / run.truth.wormPeriodSeconds
  return {
    ...base,
    conversion: run.conversion,
    driveTrain: DEMO_DRIVE_TRAIN,
    wormPeriod: turns >= 3 ? 'fitted' : 'gear',
    table: {
      ...base.table,
      origin: run.importSettings.columns.wormAngle === null ? { kind: 'run-start' } : { kind: 'worm-angle-column' },
    },
  }
}
