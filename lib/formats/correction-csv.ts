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
import { csvRecord } from './csv-cells'

/**
 * A correction table as RFC 4180 text (media type text/csv; charset=utf-8; header=present): one rectangle, a header, one
 * record per bin, CR LF. What the numbers mean stands beside them in the last two columns of the first eight records, as
 * many as the smallest table has, so that no line has to be passed over to reach the numbers.
 */
export function writeCorrectionCsv(table: WrittenTable, source: CorrectionSource): string {
  const notes = sideNotes(table, source)
  const header = csvRecord(['bin', 'worm angle (deg)', `value (${unitName(table.settings.unit)})`, 'about', 'meaning'])
  const records = table.bins.map(({ index, angleDegrees, value }, i) =>
    csvRecord([index, angleDegrees, value, ...(notes[i] ?? [null, null])]),
  )
  return header + records.join('')
}

function sideNotes(table: WrittenTable, source: CorrectionSource): [string, string | number][] {
  const { settings, wormPeriodSeconds, orders } = table
  const run = source.runName === null ? '' : ` Run: ${source.runName}.`
  const samples = source.samplesSha256 === null ? '' : ` Samples SHA-256: ${source.samplesSha256}.`
  return [
    ['value', valueMeaning(settings)],
    ['worm angle', angleMeaning(table)],
    ['worm period (s)', wormPeriodSeconds],
    ['bins', playbackMeaning(settings)],
    ['harmonics', orders.length === 0 ? 'none' : `orders ${orders.join(' ')}`],
    ['closure', closureMeaning(table)],
    ['source', `${source.name}. ${kindMeaning(source)}${run}${samples} Turnwright engine ${source.engineVersion}.`],
    ['caution', TABLE_CAUTIONS.join(' ')],
  ]
}
