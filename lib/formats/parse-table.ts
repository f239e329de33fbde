import { BodyScanner } from './body-scanner'
import { binaryFault, emptyFault } from './faults'
import { wholeFileFault } from './file-kind'
import { readColumnNames } from './column-names'
import { RowCollector } from './row-collector'
import { isBinary, toScannableBytes } from './text-encoding'
import type { ImportOutcome, ImportSettings } from './types'

/** Time between two yields; a cancel is heard within it. */
const YIELD_MILLISECONDS = 20
const ROWS_BETWEEN_CLOCK_READINGS = 512

/**
 * Reads the chosen columns of a whole file.
 *
 * Time becomes seconds since the first row that was read; displacement and declination stay in the file's unit; the worm
 * angle becomes degrees. Yields the share of the file read so far about every 20 ms. Equal input gives equal output.
 * Further kinds of file (see file-kind.ts) get a generator of their own beside `parseDelimitedText`, chosen here.
 */
export function* parseTable(bytes: Uint8Array, settings: ImportSettings): Generator<number, ImportOutcome> {
  const fault = wholeFileFault(bytes)
  if (fault) return { ok: false, fault }
  return yield* parseDelimitedText(bytes, settings)
}

function* parseDelimitedText(bytes: Uint8Array, settings: ImportSettings): Generator<number, ImportOutcome> {
  const { layout } = settings
  if (isBinary(bytes, layout.encoding)) return { ok: false, fault: binaryFault(null) }
  const text = toScannableBytes(bytes, layout.encoding)
  if (isBlankText(text)) return { ok: false, fault: emptyFault() }
  const scanner = new BodyScanner(text, layout.delimiter)
  scanner.skipTo(layout.firstDataRow)
  const collector = new RowCollector(settings, {
    capacity: Math.max(64, Math.ceil(text.length / 40)),
    nameOfColumn: (index) => readColumnNames(bytes, layout)[index] ?? `Column ${index + 1}`,
  })
  let lastYieldAt = performance.now()
  for (let lineCount = 1; ; lineCount++) {
    const kind = scanner.next()
    if (kind === 'end') break
    if (kind === 'comment') collector.takeComment(scanner.rowNumber)
    else if (kind === 'row') {
      const rowFault = collector.takeRow(scanner, scanner.rowNumber)
      if (rowFault) return { ok: false, fault: rowFault }
    }
    if (lineCount % ROWS_BETWEEN_CLOCK_READINGS === 0 && performance.now() - lastYieldAt > YIELD_MILLISECONDS) {
      yield scanner.position / text.length
      lastYieldAt = performance.now()
    }
  }
  return collector.finish()
}

/** Whether the text holds nothing but blanks and line ends. */
function isBlankText(text: Uint8Array): boolean {
  return text.every((byte) => byte === 32 || (byte >= 9 && byte <= 13) || byte === 26)
}
