import { StageWarnings } from '@/components/bench/aside'
import { NO_VIEWS, PictureSpace } from '@/components/bench/picture-space'
import { SpanChart } from '@/components/charts/span-chart'
import { FigureStrip } from '@/components/ui/figure-strip'
import type { AnalysisResult, AnalysisViews, Recipe } from '@/lib/analysis/types'
import { advice } from '@/lib/findings/advice'
import { correctionFinding, TABLE_CAUTIONS } from '@/lib/findings/correction-finding'
import { findingText } from '@/lib/findings/finding'
import { harmonicsFinding } from '@/lib/findings/harmonics-finding'
import { keyFigures, perMinute } from '@/lib/findings/key-figures'
import { toleranceText } from '@/lib/findings/method-text'
import { spansFinding } from '@/lib/findings/spans-finding'
import { spectrumFinding } from '@/lib/findings/spectrum-finding'
import { trackFinding } from '@/lib/findings/track-finding'
import { turnFinding } from '@/lib/findings/turn-finding'
import { arcsec, degrees, senseMark } from '@/lib/findings/words'
import { formatDuration, formatEstimate, formatNumber, formatPercent, formatSignificant } from '@/lib/units'
import type { NoteMarks } from './report-notes'
import { HarmonicsPicture, SpectrumPicture, TrackPicture, TurnPictures } from './report-pictures'
import { ReportFacts, ReportSection } from './report-section'
import { HarmonicsTable, LinesTable, PredictionsTable, RehearsalTable } from './report-tables'

interface ReportBodyProps {
  result: AnalysisResult
  /** Null: not there yet, or not to be had. */
  views: AnalysisViews | null
  /** Whether pictures may still come. */
  isWaiting: boolean
  recipe: Recipe
  marks: NoteMarks
}

/** Finding by finding: the sentence, the picture, the table. */
export function ReportBody({ result, views, isWaiting, recipe, marks }: ReportBodyProps) {
  const { worm, turn, table, warnings, spans, rate, residual, drift, declination } = result
  const given = advice(result, recipe)
  const sense = senseMark(recipe.conversion.senseBasis)
  const drawing = views ? { result, views, recipe, marks } : null
  const space = (heightPx: number) => (isWaiting ? <PictureSpace heightPx={heightPx}>{NO_VIEWS}</PictureSpace> : null)
  return (
    <>
      <div className="report-figures report-whole">
        <FigureStrip figures={keyFigures(result)} />
      </div>
      <ReportSection title="What to do" finding={given.sentence}>
        <p className="text-sm text-soft">
          The rule: {lowerFirst(given.rule)} {toleranceText(recipe)}
        </p>
      </ReportSection>
      <ReportSection title="Track" finding={trackFinding(result)}>
        {drawing ? <TrackPicture {...drawing} /> : space(272)}
        <ReportFacts
          rows={[
            ['drift, ″/min', formatEstimate(perMinute(drift.rateArcsecPerSecond), { isSigned: true })],
            ['span of the drift', arcsec(spans.driftArcsec)],
            ['length', formatDuration(result.run.durationSeconds)],
            ['one sample every', formatDuration(result.run.medianCadenceSeconds)],
            ...(declination ? ([['declination, RMS', arcsec(declination.rmsArcsec)]] as const) : []),
            ['left after the fit, RMS', arcsec(residual.rmsArcsec)],
          ]}
        />
        <StageWarnings warnings={warnings} stage="track" />
      </ReportSection>
      <ReportSection title="Spectrum" finding={spectrumFinding(result, recipe)}>
        {drawing ? <SpectrumPicture {...drawing} /> : space(330)}
        <LinesTable lines={result.lines} />
        <StageWarnings warnings={warnings} stage="spectrum" />
      </ReportSection>
      <ReportSection title="Harmonics of the worm" finding={harmonicsFinding(result)}>
        {worm ? (
          <>
            <HarmonicsPicture worm={worm} summary={findingText(harmonicsFinding(result))} />
            <HarmonicsTable worm={worm} />
          </>
        ) : null}
        <StageWarnings warnings={warnings} stage="harmonics" />
      </ReportSection>
      {worm && turn ? (
        <ReportSection title="One turn" finding={turnFinding(result)}>
          {drawing ? <TurnPictures {...drawing} /> : space(320)}
          <ReportFacts
            rows={[
              [
                `furthest ahead${sense}`,
                `${arcsec(worm.furthestAheadArcsec)} at ${degrees(worm.furthestAheadDegrees)}`,
              ],
              [
                `furthest behind${sense}`,
                `${arcsec(worm.furthestBehindArcsec)} at ${degrees(worm.furthestBehindDegrees)}`,
              ],
            ]}
          />
          <PredictionsTable turn={turn} />
          <StageWarnings warnings={warnings} stage="turn" />
        </ReportSection>
      ) : null}
      <ReportSection title="Spans" finding={spansFinding(result)}>
        <SpanChart spans={spans} summary={findingText(spansFinding(result))} />
        <ReportFacts
          rows={[
            ['raw without the worm', arcsec(spans.rawWithoutWormArcsec)],
            [
              'steepest rate of the worm',
              worm ? formatEstimate(worm.steepestRateArcsecPerSecond, { unit: '″/s' }) : '–',
            ],
            ['with drift and lines', formatSignificant(rate.steepestWithDriftArcsecPerSecond, 3, { unit: '″/s' })],
            [
              'guide at least every',
              rate.longestCorrectionIntervalSeconds === null
                ? 'never needed'
                : formatDuration(rate.longestCorrectionIntervalSeconds),
            ],
            [`unguided ${formatDuration(recipe.pictureExposureSeconds)} kept`, formatPercent(rate.framesKeptShare)],
            ['seeing floor', `${residual.isSeeingFloorLowerBound ? '≥ ' : ''}${arcsec(residual.seeingFloorArcsec)}`],
          ]}
        />
        <StageWarnings warnings={warnings} stage="spans" />
      </ReportSection>
      {table ? (
        <ReportSection title="What a correction table would do" finding={correctionFinding(result, recipe)}>
          <div className="report-pair report-whole grid gap-x-8 gap-y-4">
            <RehearsalTable table={table} />
            <ReportFacts
              isOneColumn
              rows={[
                ['peak to peak, before', arcsec(table.rehearsal.peakToPeakBeforeArcsec)],
                ['peak to peak, after', arcsec(table.rehearsal.peakToPeakAfterArcsec)],
                ['10\u202f% back if it slips by', `± ${formatNumber(table.rehearsal.slipForTenPercentDegrees, 1)}°`],
                ['no help left at', `± ${formatNumber(table.rehearsal.slipForNoHelpDegrees, 0)}°`],
              ]}
            />
          </div>
          <StageWarnings warnings={warnings} stage="correction" />
          <div className="report-whole">
            <h3 className="text-sm font-semibold">Before a table is loaded</h3>
            <ul className="mt-1 flex list-disc flex-col gap-1 pl-5 text-sm text-pretty">
              {TABLE_CAUTIONS.map((caution) => (
                <li key={caution}>{caution}</li>
              ))}
            </ul>
          </div>
        </ReportSection>
      ) : null}
    </>
  )
}

function lowerFirst(text: string): string {
  return text.charAt(0).toLowerCase() + text.slice(1)
}
