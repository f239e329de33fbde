import type { AnalysisResult, AnalysisViews, Recipe } from '@/lib/analysis/types'
import type { NoteActions, NumberedNote } from './notes'

/** What every stage of the worksheet is given. */
export interface StageInput {
  /** Null before the first result; then only the question and the settings are shown. */
  result: AnalysisResult | null
  /** Null where there are figures but no samples to draw. */
  views: AnalysisViews | null
  recipe: Recipe
  change: (key: string, next: Recipe) => void
  notes: readonly NumberedNote[]
  noteActions: NoteActions
  isLocked: boolean
}
