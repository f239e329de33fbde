'use client'

import { useCallback, useMemo, useState, type ReactNode } from 'react'
import { FindingText } from '@/components/findings/finding-text'
import { NoteLinkProvider } from '@/components/notes/note-link'
import { NoteList } from '@/components/notes/note-list'
import { numberNotes, type NoteActions } from '@/components/notes/note-types'
import { useNewNote } from '@/components/notes/use-new-note'
import { Button } from '@/components/ui/button'
import { Card } from '@/components/ui/card'
import { classNames } from '@/components/ui/class-names'
import { FigureStrip, type KeyFigure } from '@/components/ui/figure-strip'
import { Notice } from '@/components/ui/notice'
import { ProgressBar } from '@/components/ui/progress-bar'
import type { AnalysisOutcome, AnalysisResult, Progress, Recipe } from '@/lib/analysis/types'
import { useDisplay } from '@/lib/client/display'
import { keyFigures, type KeyFigureText } from '@/lib/findings/key-figures'
import { reasonSentence, reasonTitle } from '@/lib/findings/reason-sentence'
import { titleFinding } from '@/lib/findings/title-finding'
import type { Note } from '@/lib/schemas/api'
import type { RunFacts } from '@/lib/schemas/run-facts'
import { CorrectionStage } from './correction-stage'
import { HarmonicsStage } from './harmonics-stage'
import { DisplayNote } from './display-note'
import type { TableRequest } from './make-table'
import { SpansStage } from './spans-stage'
import { SpectrumStage } from './spectrum-stage'
import type { StageInput } from './stage-props'
import { TrackStage } from './track-stage'
import { TurnStage } from './turn-stage'
import { useRecipeAddress } from './use-recipe-address'
import { useRecipeHistory } from './use-recipe-history'

export interface BenchProps {
  /** The last outcome of the core; stays while the next one is computed. Null before the first. */
  outcome: AnalysisOutcome | null
  /** Figures as they were saved; they are shown instead of those of `outcome`, which then gives the pictures only. */
  savedResult?: AnalysisResult | null
  recipe: Recipe
  onRecipeChange: (recipe: Recipe) => void
  /** What the run or the saved analysis starts from: the address holds only what differs. The first recipe unless given. */
  baseRecipe?: Recipe
  /** Whether the settings are kept in the address bar. */
  isAddressBound?: boolean
  progress: Progress | null
  isComputing: boolean
  onCancel: () => void
  runLabel: string
  crumbs?: ReactNode
  /** Buttons at the upper right. */
  actions?: ReactNode
  notes: readonly Note[]
  noteActions?: NoteActions
  onMakeTable?: (request: TableRequest) => void | Promise<void>
  onDownloadTable?: (format: 'csv' | 'json', request: TableRequest) => void | Promise<void>
  hasWormAngle: boolean
  /** Whether a correction was playing in the mount during the run; decides what kind of table may be made. */
  mountCorrection?: RunFacts['mountCorrection']
  /** Settings can't be changed, notes and tables not be made. */
  isReadOnly: boolean
}

/** The worksheet: one finding over it, five key figures, then six stages from the raw track to the correction. */
export function Bench(props: BenchProps) {
  const { outcome, savedResult, recipe, onRecipeChange, notes, isReadOnly } = props
  const [firstRecipe] = useState(recipe)
  const editing = useRecipeHistory(recipe, onRecipeChange)
  const onRead = useCallback((read: Recipe) => onRecipeChange(read), [onRecipeChange])
  useRecipeAddress({ recipe, base: props.baseRecipe ?? firstRecipe, isOn: props.isAddressBound ?? true, onRead })

  const result = savedResult ?? (outcome?.ok ? outcome.result : null)
  const failure = !result && outcome && !outcome.ok ? outcome : null
  const noteActions = isReadOnly ? NO_ACTIONS : (props.noteActions ?? NO_ACTIONS)
  const display = useDisplay(recipe.conversion)
  const stage: StageInput = {
    result,
    views: outcome?.ok ? outcome.views : null,
    recipe,
    display,
    change: editing.change,
    notes: useMemo(() => numberNotes(notes), [notes]),
    noteActions,
    isLocked: isReadOnly,
  }

  return (
    <NoteLinkProvider>
      <div className="flex flex-col gap-4">
        <header>
          <div className="mb-1 text-sm text-soft">{props.crumbs ?? props.runLabel}</div>
          <div className="flex items-end justify-between gap-x-6 gap-y-3 max-lg:flex-col max-lg:items-start">
            <h1 className="min-w-0 flex-1 text-title font-semibold">
              {result ? (
                <FindingText finding={titleFinding(result, recipe, display)} />
              ) : failure ? (
                reasonTitle(failure.reason)
              ) : (
                `Reading ${props.runLabel}`
              )}
            </h1>
            <div className="no-print flex shrink-0 flex-wrap items-center gap-2">
              {isReadOnly ? null : <UndoButtons undo={editing.undo} redo={editing.redo} />}
              {props.actions}
            </div>
          </div>
        </header>
        {result ? <FigureStrip figures={keyFigures(result, display).map(small)} /> : null}
        {result ? <DisplayNote display={display} /> : null}
        {failure ? (
          <Card className="p-5">
            <Notice tone="error" title="There is nothing to show yet">
              {reasonSentence(failure)}
            </Notice>
          </Card>
        ) : null}
        <TrackStage {...stage} />
        {failure ? null : (
          <>
            <SpectrumStage {...stage} />
            <HarmonicsStage {...stage} />
            <TurnStage {...stage} />
            <SpansStage {...stage} />
            <CorrectionStage
              {...stage}
              hasWormAngle={props.hasWormAngle}
              making={{
                mountCorrection: props.mountCorrection ?? 'unknown',
                onMakeTable: props.onMakeTable,
                onDownloadTable: props.onDownloadTable,
                isReadOnly,
              }}
            />
            <WholeNotes notes={notes} actions={noteActions} />
          </>
        )}
        {props.isComputing ? (
          <div className="no-print pointer-events-none sticky bottom-4 z-10 mx-auto w-full max-w-xl">
            <Computing progress={props.progress} onCancel={props.onCancel} />
          </div>
        ) : null}
      </div>
    </NoteLinkProvider>
  )
}

const NO_ACTIONS: NoteActions = {}

/** Uncertainties a step smaller, so that five figures stay on one line each. */
function small({ uncertainty, ...figure }: KeyFigureText): KeyFigure {
  return uncertainty === undefined ? figure : { ...figure, uncertainty: <span className="text-sm">{uncertainty}</span> }
}

const PROGRESS_WORDS: Record<Progress['stage'], string> = {
  reading: 'Reading the samples',
  cleaning: 'Looking for gaps and stray points',
  searching: 'Searching for the worm',
  fitting: 'Fitting drift and harmonics together',
  lines: 'Looking for lines beside the worm',
  folding: 'Laying the turns over one another',
  correcting: 'Making and rehearsing the table',
}

/** What is being computed; the bar itself waits 200 ms before it shows. */
function Computing({ progress, onCancel }: { progress: Progress | null; onCancel: () => void }) {
  return (
    <div className="pointer-events-auto rounded-card border border-steel bg-card px-4 py-3 empty:hidden not-has-[[role=progressbar]]:hidden">
      <ProgressBar
        label={progress ? PROGRESS_WORDS[progress.stage] : 'Starting'}
        fraction={progress?.fraction ?? null}
        onCancel={onCancel}
      />
    </div>
  )
}

function UndoButtons({ undo, redo }: { undo: (() => void) | null; redo: (() => void) | null }) {
  return (
    <>
      <Button size="icon" disabled={!undo} aria-label="Undo" title="Undo (Ctrl+Z)" onClick={() => undo?.()}>
        <Arrow />
      </Button>
      <Button size="icon" disabled={!redo} aria-label="Redo" title="Redo (Ctrl+Shift+Z)" onClick={() => redo?.()}>
        <Arrow isMirrored />
      </Button>
    </>
  )
}

function Arrow({ isMirrored = false }: { isMirrored?: boolean }) {
  return (
    <svg viewBox="0 0 20 20" className={isMirrored ? 'size-5 -scale-x-100' : 'size-5'} aria-hidden="true">
      <path d="M4 8h8a4 4 0 0 1 0 8H8M4 8l4-4M4 8l4 4" fill="none" stroke="currentColor" strokeWidth="1.6" />
    </svg>
  )
}

/** Notes that belong to no place, after the last stage. */
function WholeNotes({ notes, actions }: { notes: readonly Note[]; actions: NoteActions }) {
  const newNote = useNewNote('whole', actions)
  const whole = notes.filter(({ anchor }) => anchor.kind === 'whole').map((note) => ({ number: null, note }))
  if (whole.length === 0 && !actions.onAdd) return null
  return (
    <Card
      aria-label="Notes on the whole analysis"
      className={classNames('flex flex-col gap-3 p-5 max-sm:px-4', whole.length === 0 && 'no-print')}
    >
      <h2 className="text-finding font-semibold">Notes on the whole analysis</h2>
      <div className="flex max-w-xl flex-col gap-3">
        <NoteList listId="notes-whole" kind="whole" notes={whole} actions={actions} />
        {newNote.element({ kind: 'whole' })}
      </div>
    </Card>
  )
}
