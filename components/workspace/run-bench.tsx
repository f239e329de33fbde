'use client'

import { useRouter } from 'next/navigation'
import { useEffect, useRef, useState } from 'react'
import { Bench } from '@/components/bench/bench'
import type { TableRequest } from '@/components/bench/make-table'
import { ShareButton } from '@/components/share/share-dialog'
import { Crumbs, type Crumb } from '@/components/shell/page-heading'
import { Button, ButtonAnchor } from '@/components/ui/button'
import { Notice } from '@/components/ui/notice'
import { ENGINE_VERSION } from '@/lib/analysis/constants'
import type { AnalysisResult, Recipe } from '@/lib/analysis/types'
import { sendJson } from '@/lib/client/fetcher'
import { readPackedColumns, saveAnalysis } from '@/lib/client/save-run'
import { useBenchAnalysis } from '@/lib/client/use-analysis'
import { compareResults, rerunFinding } from '@/lib/findings/rerun-finding'
import { correctionSchema, type Analysis, type Project, type Run } from '@/lib/schemas/api'
import { defaultRecipe } from '@/lib/schemas/recipe'
import { canEditProject, RIGHTS } from '@/lib/schemas/rights'
import { assertCurrent } from './assert-current'
import { NameDialog } from './name-dialog'
import { RenameAnalysis } from './rename-analysis'
import { useRunNotes } from './use-run-notes'

interface RunBenchProps {
  project: Project
  run: Run
  /** Who looks. */
  userId: string
  /** The saved analysis to show; without one the bench starts from the run's and the project's own settings. */
  analysis: Analysis | null
  /** Its figures as they were saved. */
  savedResult: AnalysisResult | null
}

/** The bench on a stored run, as the project has it or as an analysis was saved. */
export function RunBench({ project, run, analysis, savedResult, userId }: RunBenchProps) {
  const router = useRouter()
  const isReadOnly = !canEditProject(project)
  const [base] = useState<Recipe>(() => analysis?.recipe ?? recipeOf(project, run))
  const [recipe, setRecipe] = useState(base)
  const bench = useBenchAnalysis(recipe)
  const [isNaming, setNaming] = useState(false)
  const [isRenaming, setRenaming] = useState(false)
  const [fault, setFault] = useState<string | null>(null)
  const { loadPacked } = bench

  const isStarted = useRef(false)
  useEffect(() => {
    if (isStarted.current) return
    isStarted.current = true
    const load = async () => {
      try {
        const loaded = await loadPacked(await readPackedColumns(run))
        if (!loaded.ok) setFault(loaded.fault.message)
      } catch (error) {
        setFault(error instanceof Error ? error.message : 'The stored columns could not be fetched. Reload the page.')
      }
    }
    void load()
  }, [loadPacked, run])

  const isAsSaved = analysis !== null && JSON.stringify(recipe) === JSON.stringify(analysis.recipe)
  const computed = bench.outcome?.ok ? bench.outcome.result : null
  const shown = isAsSaved ? savedResult : computed
  const notes = useRunNotes({ project, analysisId: analysis?.id ?? null, userId })

  async function save(name: string): Promise<Analysis> {
    assertCurrent(bench)
    if (!computed) throw new Error('There are no figures to save: the run could not be analysed with these settings.')
    return saveAnalysis(project.id, { runId: run.id, name, recipe, result: { ...computed } })
  }

  async function makeTable({ kind, isAssumedSenseConfirmed }: TableRequest) {
    const source = analysis && isAsSaved ? analysis : await save(tableName('Analysis behind the table'))
    const name = tableName(kind === 'addition' ? 'Addition' : 'Table')
    const body = { analysisId: source.id, name, kind, isAssumedSenseConfirmed }
    const made = await sendJson('POST', `/api/projects/${project.id}/corrections`, body, correctionSchema)
    router.push(`/projects/${project.id}/corrections/${made.id}`)
  }

  function tableName(what: string): string {
    return `${what}, ${run.name}`.slice(0, 120)
  }

  const label = analysis?.name ?? run.name
  return (
    <>
      <Bench
        outcome={bench.outcome}
        savedResult={isAsSaved ? savedResult : null}
        recipe={recipe}
        baseRecipe={base}
        onRecipeChange={setRecipe}
        progress={bench.progress}
        isComputing={bench.isComputing}
        onCancel={bench.cancel}
        runLabel={label}
        crumbs={<Crumbs crumbs={crumbsOf(project, run, analysis)} />}
        actions={
          <>
            {analysis && isAsSaved ? (
              // A page of its own, loaded afresh: its margins on paper come with the nonce of its own answer.
              <ButtonAnchor href={`/projects/${project.id}/analyses/${analysis.id}/report`}>Print report</ButtonAnchor>
            ) : null}
            {isReadOnly ? (
              analysis && RIGHTS[project.role].unshare ? (
                <ShareButton projectId={project.id} analysisId={analysis.id} notes={notes.notes} isArchived />
              ) : null
            ) : (
              <>
                {analysis ? <ShareButton projectId={project.id} analysisId={analysis.id} notes={notes.notes} /> : null}
                {analysis ? <Button onClick={() => setRenaming(true)}>Rename</Button> : null}
                {analysis && !isAsSaved ? (
                  <Button onClick={() => setRecipe(analysis.recipe)}>Back to the saved one</Button>
                ) : null}
                <Button variant="primary" disabled={!computed || isAsSaved} onClick={() => setNaming(true)}>
                  {analysis ? 'Save as a new analysis' : 'Save analysis'}
                </Button>
              </>
            )}
          </>
        }
        notes={notes.notes}
        noteActions={notes.actions}
        onMakeTable={shown?.table ? makeTable : undefined}
        hasWormAngle={bench.loaded?.ok === true && bench.loaded.hasWormAngle}
        mountCorrection={run.facts.mountCorrection}
        isReadOnly={isReadOnly}
      />
      <div className="no-print flex flex-col gap-3 empty:hidden">
        {(fault ?? bench.fault) ? (
          <Notice tone="error" title="The recording could not be worked on" isLive>
            {fault ?? `Reload the page. (${bench.fault})`}
          </Notice>
        ) : null}
        {analysis && savedResult && isAsSaved && bench.isCurrent && computed ? (
          <Notice>
            {analysis.engineVersion === ENGINE_VERSION
              ? rerunFinding(compareResults(savedResult, computed))
              : `Saved by version ${analysis.engineVersion} of the computation; the pictures are drawn by version ${ENGINE_VERSION}. ${rerunFinding(compareResults(savedResult, computed))}`}
          </Notice>
        ) : null}
      </div>
      {analysis ? <RenameAnalysis analysis={analysis} isOpen={isRenaming} onClose={() => setRenaming(false)} /> : null}
      <NameDialog
        isOpen={isNaming}
        onClose={() => setNaming(false)}
        title="Save this analysis"
        label="Name of the analysis"
        initial={analysis ? `${analysis.name}, changed` : 'First look'}
        onName={async (name) => {
          const saved = await save(name)
          router.push(`/projects/${project.id}/analyses/${saved.id}`)
        }}
      />
    </>
  )
}

function crumbsOf(project: Project, run: Run, analysis: Analysis | null): Crumb[] {
  const root = `/projects/${project.id}`
  return [
    { label: project.name, href: root },
    ...(analysis
      ? [
          { label: 'Analyses', href: `${root}/analyses` },
          { label: run.name, href: `${root}/runs/${run.id}` },
          { label: analysis.name },
        ]
      : [{ label: 'Runs', href: `${root}/runs` }, { label: run.name }]),
  ]
}

function recipeOf(project: Project, run: Run): Recipe {
  const fresh = defaultRecipe()
  return { ...fresh, conversion: run.conversion ?? fresh.conversion, driveTrain: project.driveTrain }
}
