import { ENGINE_VERSION } from '@/lib/analysis/constants'
import type { AnalysisResult, LeftOutCount, Recipe, WindowName } from '@/lib/analysis/types'
import { formatCount, formatDuration, formatEstimate, formatNumber, formatPeriod, formatProbability } from '@/lib/units'
import { errorModelSentence, harmonicCountSentence } from './harmonics-finding'
import { compareResults, rerunFinding } from './rerun-finding'
import { arcsec, counted } from './words'

/** One paragraph of “how this was found”, under a word or two that name it. */
export interface MethodParagraph {
  title: string
  text: string
}

/** How the figures came about, in plain words, for a reader who has nothing but the report. */
export function methodText(result: AnalysisResult, recipe: Recipe): MethodParagraph[] {
  return [
    { title: 'From the recording to the axis', text: `${conversionText(recipe)} ${timeText(recipe)}` },
    { title: 'Which way is ahead', text: senseText(recipe) },
    { title: 'What was left out', text: leftOutText(result, recipe) },
    { title: 'What was fitted', text: fitText(result, recipe) },
    { title: 'Standard errors', text: `${errorModelSentence(result.errorModel)} ${scaleText(result)}` },
    { title: 'Spectrum', text: spectrumText(recipe) },
    ...(result.turn ? [{ title: 'Rehearsal', text: rehearsalText(result) }] : []),
  ]
}

const UNIT_WORDS: Record<Recipe['conversion']['displacementUnit'], string> = {
  px: 'pixels',
  arcsec: 'arc seconds',
  'ra-seconds': 'seconds of right ascension',
}

function conversionText({ conversion }: Recipe): string {
  const { displacementUnit, imageScaleArcsecPerPx, frame, declinationDegrees } = conversion
  const scale =
    displacementUnit === 'px' && imageScaleArcsecPerPx !== null
      ? ` with an image scale of ${formatNumber(imageScaleArcsecPerPx, 3, { unit: '″/px' })}`
      : ''
  const place =
    displacementUnit === 'ra-seconds' || frame === 'axis'
      ? 'It was measured on the axis, so the declination plays no part.'
      : declinationDegrees === null
        ? 'It was measured on the sky.'
        : `It was measured on the sky at a declination of ${formatNumber(declinationDegrees, 1, { unit: '°' })}, and divided by its cosine.`
  return `The displacement was recorded in ${UNIT_WORDS[displacementUnit]} and turned into arc seconds of the right-ascension axis${scale}. ${place}`
}

function timeText({ conversion: { exposureSeconds, timeStamp } }: Recipe): string {
  if (timeStamp === 'mid') return 'Time stamps mark the middle of each exposure.'
  const end = timeStamp === 'start' ? 'start' : 'end'
  return exposureSeconds === null
    ? `Time stamps mark the ${end} of exposures whose length is not given.`
    : `Time stamps mark the ${end} of each exposure of ${formatDuration(exposureSeconds)}; half of it was taken into account.`
}

function senseText({ conversion: { senseBasis } }: Recipe): string {
  return senseBasis === 'proven'
    ? 'The sense is proven: it was tested which way the recorded value moves when the axis runs ahead.'
    : 'The sense is only assumed. Sizes hold all the same, but ahead and behind may be the other way round.'
}

const LEFT_OUT_WORDS: Record<LeftOutCount['reason'], string> = {
  missing: 'without a value',
  'not-finite': 'not finite',
  'repeated-time': 'of a repeated time',
  excluded: 'excluded by hand',
  stray: 'stray points',
}

function leftOutText({ rows, used, leftOut, run }: AnalysisResult, { excludedSpans, isStrayPointFilterOn }: Recipe) {
  const reasons = leftOut
    .filter(({ count }) => count > 0)
    .map(({ reason, count }) => `${formatCount(count)} ${LEFT_OUT_WORDS[reason]}`)
  const spans = excludedSpans.map(
    ({ startSeconds, endSeconds }) =>
      `${formatNumber(startSeconds / 60, 2)} to ${formatNumber(endSeconds / 60, 2, { unit: 'min' })}`,
  )
  return [
    `${formatCount(used)} of ${formatCount(rows)} rows were used, one every ${formatDuration(run.medianCadenceSeconds)}, over ${formatDuration(run.durationSeconds)}.`,
    reasons.length === 0 ? 'None was left out.' : `Left out: ${reasons.join(', ')}.`,
    spans.length === 0 ? '' : `By hand: ${spans.join('; ')}.`,
    run.gaps.length === 0 ? '' : `The record has ${counted(run.gaps.length, 'gap')}; nothing was filled in.`,
    isStrayPointFilterOn ? '' : 'The filter for stray points was off.',
  ]
    .filter((text) => text !== '')
    .join(' ')
}

function fitText(result: AnalysisResult, recipe: Recipe): string {
  const { worm, lines, drift, modelChoice } = result
  const degree = drift.degree === 0 ? 'a constant' : `a drift of degree ${drift.degree}`
  if (!worm) return `Only ${degree} was fitted: the record gives no figure for the worm.`
  const others = lines.length === 0 ? '' : ` and ${counted(lines.length, 'further line')}`
  const period = {
    fitted: 'The worm’s period was fitted with them',
    gear: 'The worm’s period was held at what the drive train gives',
    typed: 'The worm’s period was held as typed',
  }[worm.periodSource]
  const chosen = modelChoice?.isDegreeChosenByEvidence ? ', its degree chosen by evidence' : ''
  return `By least squares, together: ${degree}${chosen}, ${counted(worm.harmonics.length, 'harmonic')} of the worm${others}. ${period}: ${formatEstimate(worm.periodSeconds, { unit: 's', significantDigits: 7 })}. ${harmonicCountSentence(modelChoice, recipe)}`
}

function scaleText({ scaleUncertaintyPercent }: AnalysisResult): string {
  return scaleUncertaintyPercent === null
    ? 'No uncertainty is given for the image scale; whatever it is, it scales every figure in ″ alike.'
    : `The uncertainty of the image scale, ± ${formatNumber(scaleUncertaintyPercent, 1, { unit: '%' })}, is not in them: it scales every figure in ″ alike, and cancels between runs with the same optics.`
}

const WINDOW_WORDS: Record<WindowName, string> = {
  rectangular: 'no window',
  hann: 'a Hann window',
  hamming: 'a Hamming window',
  blackman: 'a Blackman window',
  'blackman-harris': 'a Blackman–Harris window',
  'flat-top': 'a flat-top window',
}

function spectrumText({ spectrumWindow, isLineSearchOn, chanceLevel }: Recipe): string {
  const window =
    typeof spectrumWindow === 'string'
      ? WINDOW_WORDS[spectrumWindow]
      : `a Kaiser window of β = ${formatNumber(spectrumWindow.beta, 2)}`
  const drawn = `The spectrum is drawn with ${window}, on the times as they were recorded.`
  return isLineSearchOn
    ? `${drawn} Lines beside the worm were taken in one by one while noise alone would give one as large in fewer than ${formatProbability(chanceLevel)}, and everything was fitted again each time.`
    : `${drawn} Lines beside the worm were not looked for.`
}

function rehearsalText({ turn, table }: AnalysisResult): string {
  const turns = turn?.completeTurns ?? 0
  return turn?.heldOutReduction === null || turn?.heldOutReduction === undefined
    ? `With ${counted(turns, 'complete turn')} none can be foretold by the others.`
    : `Each of ${counted(turns, 'complete turn')} was foretold from the others, without its own samples.${table ? ` The table behind the rehearsal has ${table.settings.binCount} bins and the worm period ${formatPeriod(table.wormPeriodSeconds)}.` : ''}`
}

/** The tolerance that the advice is measured by. */
export function toleranceText({ toleranceSkyArcsec, pictureExposureSeconds }: Recipe): string {
  return `Measured by pictures of ${formatDuration(pictureExposureSeconds)} that tolerate ${arcsec(toleranceSkyArcsec)} on the sky.`
}

/** What came out when the figures of the report were computed again in the reader’s browser. */
export function recomputedText(saved: AnalysisResult, again: AnalysisResult): string {
  const sentence = rerunFinding(compareResults(saved, again))
  return saved.engineVersion === ENGINE_VERSION
    ? sentence
    : `The figures were saved by version ${saved.engineVersion} of the computation; the pictures are drawn by version ${ENGINE_VERSION}. ${sentence}`
}
