import { createHash } from 'node:crypto'
import { readFile } from 'node:fs/promises'
import { basename } from 'node:path'
import { drain } from '@/lib/analysis/drain'
import type { Conversion, RunColumns } from '@/lib/analysis/types'
import { hintsFromMetadata, type MetadataHints } from '@/lib/formats/metadata-hints'
import { parseTable } from '@/lib/formats/parse-table'
import { previewTable } from '@/lib/formats/preview-table'
import type { ColumnChoice, ParsedRun, PreviewColumn, TablePreview } from '@/lib/formats/types'
import type { AnalyseOptions } from './analyse-options'
import { CliFault } from './cli-fault'

export interface Recording {
  fileSha256: string
  columns: RunColumns
  skipped: ParsedRun['skipped']
  displacementUnit: Conversion['displacementUnit']
  hints: MetadataHints
  /** What was guessed rather than told, one sentence each. */
  assumptions: { code: string; message: string }[]
}

/** @throws {CliFault} naming the file, the place in it and the remedy */
export async function readRecording(options: AnalyseOptions): Promise<Recording> {
  const bytes = await readBytes(options.file)
  const outcome = previewTable(bytes)
  if (!outcome.ok) throw new CliFault(`${basename(options.file)}: ${outcome.fault.message}`)
  const { preview } = outcome
  const columns = chooseColumns(preview, options)
  const parsed = drain(parseTable(bytes, { version: 1, layout: preview.layout, columns }))
  if (!parsed.ok) throw new CliFault(`${basename(options.file)}: ${parsed.fault.message}`)
  const nameOf = (index: number) => `“${preview.columns[index].name}” (column ${index + 1})`
  const assumptions: Recording['assumptions'] = []
  if (options.columns.time === null) {
    const message = `Time is taken from ${nameOf(columns.time)} in ${columns.timeUnit}; --time names another column.`
    assumptions.push({ code: 'time-column-guessed', message })
  }
  if (options.columns.ra === null) {
    const message = `Displacement is taken from ${nameOf(columns.displacement)}; --ra names another column.`
    assumptions.push({ code: 'ra-column-guessed', message })
  }
  if (options.unit === null) {
    const message = `Displacement is taken to be in ${columns.displacementUnit}; --unit names another one.`
    assumptions.push({ code: 'unit-guessed', message })
  }
  return {
    fileSha256: createHash('sha256').update(bytes).digest('hex'),
    columns: parsed.columns,
    skipped: parsed.skipped,
    displacementUnit: columns.displacementUnit,
    hints: hintsFromMetadata(preview.metadata),
    assumptions,
  }
}

async function readBytes(file: string): Promise<Uint8Array> {
  try {
    return await readFile(file)
  } catch (error) {
    const code = error instanceof Error && 'code' in error ? error.code : null
    const why =
      code === 'ENOENT'
        ? 'there is no such file'
        : code === 'EISDIR'
          ? 'this is a folder; name a file in it'
          : code === 'EACCES'
            ? 'this user may not read it'
            : String(code ?? error)
    throw new CliFault(`${file}: ${why}`)
  }
}

/** The guess, with what the options say put in its place; a column keeps the unit that it would be guessed to have. */
function chooseColumns(preview: TablePreview, { columns: named, unit }: AnalyseOptions): ColumnChoice {
  const guessOf = (role: PreviewColumn['guess']) => preview.columns.find(({ guess }) => guess === role)?.index ?? null
  const chosen = {
    '--time': named.time === null ? null : findColumn(preview, named.time),
    '--ra': named.ra === null ? null : findColumn(preview, named.ra),
    '--dec': named.dec === null ? null : findColumn(preview, named.dec),
    '--worm-angle': named.wormAngle === null ? null : findColumn(preview, named.wormAngle),
  }
  const taken = new Map<number, string>()
  for (const [option, column] of Object.entries(chosen)) {
    if (column === null) continue
    const other = taken.get(column)
    if (other !== undefined) {
      throw new CliFault(`${other} and ${option} name the same column, “${preview.columns[column].name}”`)
    }
    taken.set(column, option)
  }
  /** A guess yields to whoever named its column for something else. */
  const freeGuess = (role: PreviewColumn['guess']) => {
    const guessed = guessOf(role)
    return guessed === null || taken.has(guessed) ? null : guessed
  }
  const time = chosen['--time'] ?? freeGuess('time')
  const displacement = chosen['--ra'] ?? freeGuess('displacement')
  if (time === null || displacement === null) {
    const [what, option] = time === null ? ['time', '--time'] : ['right ascension', '--ra']
    const isAnyConstant = preview.columns.some(({ smallest, largest }) => smallest !== null && smallest === largest)
    const passedOver = isAnyConstant ? ' (one that never changes is passed over)' : ''
    throw new CliFault(
      `No column looks like ${what}${passedOver}: name it with ${option}. There are ${listOf(preview)}`,
    )
  }
  const wormAngle = chosen['--worm-angle'] ?? freeGuess('worm-angle')
  return {
    time,
    timeUnit: preview.columns[time].unitIf.time,
    displacement,
    displacementUnit: unit ?? preview.columns[displacement].unitIf.displacement,
    declination: chosen['--dec'] ?? freeGuess('declination'),
    wormAngle,
    wormAngleUnit: wormAngle === null ? 'degrees' : preview.columns[wormAngle].unitIf.wormAngle,
  }
}

function findColumn(preview: TablePreview, name: string): number {
  const wanted = name.trim().toLowerCase()
  const byName = preview.columns.filter((column) => column.name.trim().toLowerCase() === wanted)
  if (byName.length === 1) return byName[0].index
  if (byName.length > 1) throw new CliFault(`Several columns are called “${name}”: give the number of one, from 1`)
  const number = Number(wanted)
  if (Number.isInteger(number) && number >= 1 && number <= preview.columns.length) return number - 1
  throw new CliFault(`There is no column “${name}”. There are ${listOf(preview)}`)
}

function listOf(preview: TablePreview): string {
  return preview.columns.map((column) => `${column.index + 1} “${column.name}”`).join(', ')
}
