import { saveText } from '@/components/charts/save-picture'
import type { TableRequest } from '@/components/bench/make-table'
import type { AnalysisResult, Recipe } from '@/lib/analysis/types'
import { writeCorrectionCsv } from '@/lib/formats/correction-csv'
import { writeCorrectionJson } from '@/lib/formats/correction-json'
import type { CorrectionSource } from '@/lib/formats/correction-words'

interface TableDownload {
  format: 'csv' | 'json'
  request: TableRequest
  result: AnalysisResult
  recipe: Recipe
  runName: string
}

/** Writes the table of the bench as a file, without a server. */
export function downloadTable({ format, request, result, recipe, runName }: TableDownload): void {
  if (!result.table) throw new Error('There is no table yet: the run has no worm figure to make one of.')
  const source: CorrectionSource = {
    name: `Correction table of ${runName}`,
    kind: request.kind,
    senseBasis: recipe.conversion.senseBasis,
    runName,
    samplesSha256: null,
    engineVersion: result.engineVersion,
  }
  if (format === 'csv') saveText(writeCorrectionCsv(result.table, source), 'correction-table.csv', 'text/csv')
  else saveText(writeCorrectionJson(result.table, source), 'correction-table.json', 'application/json')
}
