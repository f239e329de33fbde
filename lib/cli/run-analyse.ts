import { analyseAtOnce } from '@/lib/analysis/analyse'
import type { Conversion, Recipe } from '@/lib/analysis/types'
import { reasonSentence } from '@/lib/findings/reason-sentence'
import { defaultRecipe } from '@/lib/schemas/recipe'
import { HELP, parseAnalyseOptions, type AnalyseOptions } from './analyse-options'
import { analysisReport } from './analyse-report'
import { CliFault } from './cli-fault'
import { chooseConversion } from './choose-conversion'
import { readRecording } from './read-recording'

/**
 * What the bench computes, without a browser or a database, as the text of one JSON object.
 *
 * @throws {CliFault} for what the person at the command line can mend
 */
export async function runAnalyse(argv: string[]): Promise<string> {
  const options = parseAnalyseOptions(argv)
  if (options.isHelp) return HELP
  const recording = await readRecording(options)
  const { conversion, assumptions } = chooseConversion(options, recording)
  const outcome = analyseAtOnce(recording.columns, recipeFor(options, conversion))
  if (!outcome.ok) throw new CliFault(`Nothing can be computed (${outcome.reason}): ${reasonSentence(outcome)}`)
  const report = analysisReport({
    result: outcome.result,
    recording,
    assumptions: [...recording.assumptions, ...assumptions],
  })
  return `${JSON.stringify(report, null, options.isPretty ? 2 : undefined)}\n`
}

export function recipeFor(
  { teeth, wormPeriodSeconds, drift, harmonics }: AnalyseOptions,
  conversion: Conversion,
): Recipe {
  const recipe = defaultRecipe()
  return {
    ...recipe,
    conversion,
    driftDegree: drift,
    harmonicCount: harmonics,
    driveTrain: { ...recipe.driveTrain, wheelTeeth: teeth },
    wormPeriod: teeth !== null ? 'gear' : wormPeriodSeconds !== null ? 'typed' : 'fitted',
    typedPeriodSeconds: wormPeriodSeconds,
  }
}
