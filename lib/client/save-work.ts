import type { AnalysisResult, Recipe } from '@/lib/analysis/types'
import { projectSchema, type Analysis, type Run } from '@/lib/schemas/api'
import { sendJson } from './fetcher'
import type { KeptWork } from './kept-work'
import { importRun, saveAnalysis, uploadRun } from './save-run'

export interface WorkToSave {
  work: KeptWork
  recipe: Recipe
  result: AnalysisResult
  /** Null: make a project of this name first. */
  projectId: string | null
  projectName: string
  runName: string
  analysisName: string
}

/**
 * Saves the open bench's work step by step: project, file, columns, analysis. A saver remembers the steps that have
 * succeeded, so that trying again after a fault goes on where it stopped and nothing is stored twice.
 */
export function createWorkSaver() {
  let project: { id: string; name: string } | null = null
  let run: Run | null = null

  return async function save(toSave: WorkToSave, onStep: (step: string) => void): Promise<Analysis> {
    const { work, recipe, result, projectName, runName, analysisName } = toSave
    let projectId = toSave.projectId
    if (projectId === null) {
      onStep('Making the project…')
      if (project?.name !== projectName) {
        const body = { name: projectName, driveTrain: recipe.driveTrain }
        project = await sendJson('POST', '/api/projects', body, projectSchema)
      }
      projectId = project.id
    }
    if (run?.projectId !== projectId) {
      onStep('Storing the recording…')
      run = await uploadRun({ projectId, runName, fileName: work.fileName, bytes: work.bytes })
    }
    if (run.status === 'uploaded') {
      onStep('Reading its columns…')
      run = await importRun(run, { settings: work.settings, conversion: recipe.conversion, facts: work.facts })
    }
    onStep('Saving the analysis…')
    return saveAnalysis(projectId, { runId: run.id, name: analysisName, recipe, result: { ...result } })
  }
}
