import type { AnalysisResult, AnalysisViews, Recipe } from '@/lib/analysis/types'
import type { Display } from '@/lib/display-units'
import type { NoteActions, NumberedNote } from '@/components/notes/note-types'

/** What every stage of the worksheet is given. */
export interface StageInput {
  /** Null before the first result; then only the question and the settings are shown. */
  result: AnalysisResult | null
  /** Null where there are figures but no samples to draw. */
  views: AnalysisViews | null
  recipe: Recipe
  /** How swings and displacements of this run are shown to the person. */
  display: Display
  change: (key: string | null, next: Recipe) => void
  notes: readonly NumberedNote[]
  noteActions: NoteActions
  isLocked: boolean
}
