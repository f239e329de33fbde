import type { Conversion } from '@/lib/analysis/types'
import { defaultRecipe } from '@/lib/schemas/recipe'
import type { AnalyseOptions } from './analyse-options'
import type { ReportWarning } from './analyse-report'
import { CliFault } from './cli-fault'
import type { Recording } from './read-recording'

/**
 * How the recorded numbers become tracking error: what the options say, else the file's preamble, else a plain
 * assumption; the last two are told.
 *
 * @throws {CliFault} where a number is missing that cannot be assumed
 */
export function chooseConversion(
  options: AnalyseOptions,
  { displacementUnit, hints }: Pick<Recording, 'displacementUnit' | 'hints'>,
): { conversion: Conversion; assumptions: ReportWarning[] } {
  const assumptions: ReportWarning[] = []
  const tell = (code: string, message: string) => void assumptions.push({ code, message })
  /** An option's value, or the preamble's, which is then told. */
  const given = (code: string, option: number | null, hint: number | null, say: (value: number) => string) => {
    if (option === null && hint !== null) tell(code, `${say(hint)} stands in the file’s preamble.`)
    return option ?? hint
  }

  const isRaSeconds = displacementUnit === 'ra-seconds'
  if (isRaSeconds && options.frame === 'sky') {
    throw new CliFault('Seconds of right ascension are on the axis: leave out --on sky, or name another --unit')
  }
  const frame = isRaSeconds ? 'axis' : (options.frame ?? 'sky')
  if (!isRaSeconds && options.frame === null) {
    tell('frame-assumed', 'Displacement is taken to be measured on the sky; --on axis says otherwise.')
  }
  const declinationDegrees =
    frame === 'sky'
      ? given(
          'declination-from-file',
          options.declinationDegrees,
          hints.declinationDegrees,
          (degrees) => `The declination of ${degrees}°`,
        )
      : options.declinationDegrees
  if (frame === 'sky' && declinationDegrees === null) {
    throw new CliFault('Displacement on the sky needs the star’s declination: --declination DEG (or --on axis)')
  }
  const imageScaleArcsecPerPx =
    displacementUnit === 'px'
      ? given(
          'scale-from-file',
          options.scaleArcsecPerPx,
          hints.imageScaleArcsecPerPx,
          (scale) => `The image scale of ${scale} ″/px`,
        )
      : null
  if (displacementUnit === 'px' && imageScaleArcsecPerPx === null) {
    throw new CliFault('Displacement in px needs the image scale: --scale ARCSEC_PER_PX')
  }
  if (displacementUnit !== 'px' && options.scaleArcsecPerPx !== null) {
    tell('scale-unused', `The image scale is not used: displacement is in ${displacementUnit}.`)
  }
  if (options.positive === null) {
    tell(
      'positive-assumed',
      'A growing value is taken to mean that the axis is ahead; --positive behind says otherwise.',
    )
  }
  const exposureSeconds = given(
    'exposure-from-file',
    options.exposureSeconds,
    hints.exposureSeconds,
    (seconds) => `The exposure of ${seconds} s`,
  )
  if (exposureSeconds === null) {
    tell(
      'exposure-unknown',
      'The exposure is not known, so amplitudes are not corrected for its smoothing; --exposure S tells it.',
    )
  }
  if (options.stamp === null) {
    tell('stamp-assumed', 'Time stamps are taken to mark the middle of exposures; --stamp start or end says otherwise.')
  }
  return {
    conversion: {
      ...defaultRecipe().conversion,
      displacementUnit,
      imageScaleArcsecPerPx,
      declinationDegrees,
      frame,
      positiveMeans: options.positive ?? 'ahead',
      // Whoever tells the sense has settled it; the core warns of one that is assumed.
      senseBasis: options.positive === null ? 'assumed' : 'proven',
      exposureSeconds,
      timeStamp: options.stamp ?? 'mid',
    },
    assumptions,
  }
}
