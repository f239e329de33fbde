import { expect, test } from 'vitest'
import { analyseAtOnce } from '@/lib/analysis/analyse'
import { DAY_COLORS } from '@/lib/figures/chart-colors'
import { spectrumFigure } from '@/lib/figures/spectrum-figure'
import { tablePicture } from '@/lib/figures/table-picture'
import { trackFigure } from '@/lib/figures/track-figure'
import { slipFigure, turnFigure } from '@/lib/figures/turn-figure'
import { advice } from '@/lib/findings/advice'
import { correctionFinding } from '@/lib/findings/correction-finding'
import { findingText } from '@/lib/findings/finding'
import { harmonicsFinding } from '@/lib/findings/harmonics-finding'
import { keyFigures } from '@/lib/findings/key-figures'
import { spansFinding } from '@/lib/findings/spans-finding'
import { spectrumFinding } from '@/lib/findings/spectrum-finding'
import { titleFinding } from '@/lib/findings/title-finding'
import { trackFinding } from '@/lib/findings/track-finding'
import { turnFinding } from '@/lib/findings/turn-finding'
import { warningSentence } from '@/lib/findings/warning-sentence'
import { defaultRecipe } from '@/lib/schemas/recipe'
import { SAMPLE_CONVERSION, SAMPLE_DRIVE_TRAIN, sampleRun } from '@/lib/simulate/sample'

test('the sample run is told and drawn from the core’s own result', () => {
  const recipe = { ...defaultRecipe(), conversion: SAMPLE_CONVERSION, driveTrain: SAMPLE_DRIVE_TRAIN }
  const outcome = analyseAtOnce(sampleRun().columns, recipe)
  if (!outcome.ok) throw new Error(outcome.reason)
  const { result, views } = outcome
  const { turn, slip } = views
  if (!result.worm || !result.table || !turn || !slip) throw new Error('the sample run holds a worm')

  // A wheel of 152 teeth turns its worm once in 86164.0905 s / 152 = 566.869 s.
  const { value, stderr } = result.worm.periodSeconds
  expect(Math.abs(value - 86164.0905 / 152)).toBeLessThan(3 * (stderr ?? 0))
  expect(keyFigures(result)[0].value).toBe(value.toFixed(2))

  const sentences = [
    titleFinding(result, recipe),
    trackFinding(result),
    spectrumFinding(result, recipe),
    harmonicsFinding(result),
    turnFinding(result),
    spansFinding(result),
    correctionFinding(result, recipe),
    advice(result, recipe).sentence,
  ].map(findingText)
  for (const sentence of [...sentences, ...result.warnings.map((each) => warningSentence(each).text)]) {
    expect(sentence).not.toMatch(/NaN|undefined|null|Infinity|–/)
  }
  expect(sentences[0]).toMatch(/^The worm swings the axis \d+\.\d″ each turn, and repeats well enough to correct$/)
  expect(sentences[1]).toContain('6.0 turns')
  expect(sentences[1]).toContain('three stray points')
  expect(sentences[2]).toContain('fits the motor belt')

  const frame = { colors: DAY_COLORS, widthPx: 870, zoom: null }
  const figures = [
    trackFigure({ result, track: views.track, excludedSpans: [], notes: [], senseMark: '', frame }),
    spectrumFigure({ result, spectrum: views.spectrum, chanceLevel: 0.001, isBeforeShown: true, notes: [], frame }),
    turnFigure({ turn, senseMark: '', notes: [], frame }),
    slipFigure({ slip, ...result.table.rehearsal, frame }),
  ]
  for (const { layout, data, x } of figures) {
    const ranges = [...x.range, ...(layout.xaxis?.range ?? []), ...(layout.yaxis?.range ?? [])]
    expect(ranges.every((end) => Number.isFinite(Number(end)))).toBe(true)
    for (const trace of data) expect((trace.x as ArrayLike<number>).length).toBeLessThanOrEqual(6000)
  }

  // With default bins of 1.5° a bar and the mirrored error curve agree within the loss that the rehearsal states.
  const { bars, curve } = tablePicture(result.table, result.worm, result.run)
  const largest = Math.max(...curve.map((point) => Math.abs(point.value)))
  for (const { angleDegrees, value: bar } of bars.filter((each) => each.angleDegrees % 1 === 0)) {
    expect(Math.abs(bar + curve[angleDegrees].value)).toBeLessThan(0.02 * largest)
  }
})
