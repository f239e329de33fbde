import 'server-only'
import { readFile } from 'node:fs/promises'
import { join } from 'node:path'
import { analyseAtOnce } from '@/lib/analysis/analyse'
import { drain } from '@/lib/analysis/drain'
import { landingPicture, type LandingPicture } from '@/lib/figures/landing-picture'
import { parseTable } from '@/lib/formats/parse-table'
import { defaultRecipe } from '@/lib/schemas/recipe'
import { SAMPLE_CONVERSION, SAMPLE_DRIVE_TRAIN, SAMPLE_FILE_NAME, SAMPLE_IMPORT } from '@/lib/simulate/sample'

let cached: Promise<LandingPicture> | undefined

/** Reads and analyses the sample run of public/ as the bench would; once per process, at the first request. */
export function samplePicture(): Promise<LandingPicture> {
  cached ??= drawSample().catch((error: unknown) => {
    cached = undefined
    throw error
  })
  return cached
}

async function drawSample(): Promise<LandingPicture> {
  const bytes = await readFile(join(process.cwd(), 'public', SAMPLE_FILE_NAME))
  const parsed = drain(parseTable(bytes, SAMPLE_IMPORT))
  if (!parsed.ok) throw new Error(`The sample run cannot be read: ${parsed.fault.message}`)
  const recipe = { ...defaultRecipe(), conversion: SAMPLE_CONVERSION, driveTrain: SAMPLE_DRIVE_TRAIN }
  const outcome = analyseAtOnce(parsed.columns, recipe)
  if (!outcome.ok) throw new Error(`The sample run cannot be analysed: ${outcome.reason}`)
  return landingPicture(outcome)
}
