import {
  TABLE_CAUTIONS,
  angleMeaning,
  closureMeaning,
  kindMeaning,
  playbackMeaning,
  unitName,
  valueMeaning,
  type CorrectionSource,
  type WrittenTable,
} from './correction-words'

/**
 * A correction table as JSON (RFC 8259) that explains itself: every quantity names its unit, and what sign, origin and
 * direction mean is said in words beside the settings.
 */
export function writeCorrectionJson(table: WrittenTable, source: CorrectionSource): string {
  const { settings, bins, rehearsal } = table
  const document = {
    format: 'turnwright-correction-table',
    version: 1,
    name: source.name,
    use: { kind: source.kind, senseBasis: source.senseBasis, inWords: kindMeaning(source) },
    value: {
      quantity: settings.quantity,
      unit: unitName(settings.unit),
      meaning: settings.meaning,
      inWords: valueMeaning(settings),
    },
    wormAngle: {
      unit: 'deg',
      direction: settings.angleDirection,
      origin: settings.origin,
      originTime: { value: table.originTimeSeconds, unit: 's', from: 'first row of the recording' },
      offset: { value: settings.offsetDegrees, unit: 'deg' },
      inWords: angleMeaning(table),
    },
    wormPeriod: { value: table.wormPeriodSeconds, unit: 's' },
    playback: {
      kind: settings.playback,
      gain: settings.gain,
      binCount: settings.binCount,
      inWords: playbackMeaning(settings),
    },
    harmonics: {
      orders: table.orders,
      amplitudes: rehearsal?.orders.map(({ order, beforeArcsec, afterArcsec, isIncluded }) => ({
        order,
        isIncluded,
        before: { value: beforeArcsec, unit: 'arcsec' },
        after: { value: afterArcsec, unit: 'arcsec' },
      })),
    },
    closure: { value: table.closureError, unit: unitName(settings.unit), inWords: closureMeaning(table) },
    largestRate:
      table.largestRateArcsecPerSecond === undefined
        ? undefined
        : { value: table.largestRateArcsecPerSecond, unit: 'arcsec/s' },
    rehearsal: rehearsal && {
      peakToPeakBefore: { value: rehearsal.peakToPeakBeforeArcsec, unit: 'arcsec' },
      peakToPeakAfter: { value: rehearsal.peakToPeakAfterArcsec, unit: 'arcsec' },
      heldOutReduction: { value: rehearsal.heldOutReduction, unit: 'share of the RMS on turns it was not made from' },
      slipForTenPercent: { value: rehearsal.slipForTenPercentDegrees, unit: 'deg of worm angle' },
      slipForNoHelp: { value: rehearsal.slipForNoHelpDegrees, unit: 'deg of worm angle' },
      binningLoss: { value: rehearsal.binningLossShare, unit: 'share of an included harmonic' },
    },
    bins: bins.map(({ index, angleDegrees, value }) => ({
      bin: index,
      wormAngle: angleDegrees,
      value: value === 0 ? 0 : value,
    })),
    cautions: TABLE_CAUTIONS,
    source: {
      run: source.runName,
      samplesSha256: source.samplesSha256,
      engine: 'Turnwright',
      engineVersion: source.engineVersion,
    },
  }
  return `${JSON.stringify(document, null, 2)}\n`
}
