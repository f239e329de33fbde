import { parseArgs } from 'node:util'
import { CliFault } from './cli-fault'

export interface AnalyseOptions {
  file: string
  isHelp: boolean
  isPretty: boolean
  teeth: number | null
  wormPeriodSeconds: number | null
  /** Heads of columns, or their numbers from 1. */
  columns: { time: string | null; ra: string | null; dec: string | null; wormAngle: string | null }
  unit: 'px' | 'arcsec' | 'ra-seconds' | null
  scaleArcsecPerPx: number | null
  declinationDegrees: number | null
  positive: 'ahead' | 'behind' | null
  frame: 'sky' | 'axis' | null
  exposureSeconds: number | null
  stamp: 'start' | 'mid' | 'end' | null
  drift: 'auto' | 0 | 1 | 2 | 3
  harmonics: 'auto' | number
}

export const HELP = `Reads a recording and prints one JSON object: what moves the axis, with standard errors.

npm run --silent analyse -- FILE [options]

The worm
  --teeth N             teeth of the worm wheel; the period is then the gear's own
  --worm-period S       the worm's period in seconds, held; without either it is searched for
The file (columns and units are guessed; a column is named by its head or its number from 1)
  --time COL  --ra COL  --dec COL  --worm-angle COL
  --unit px|arcsec|ra-seconds
The axis
  --scale ARCSEC_PER_PX image scale, needed for px
  --declination DEG     of the star, needed for what is recorded on the sky
                        (scale, declination and exposure may also stand in the file's preamble)
  --on sky|axis         where px and arcsec are measured; sky unless told
  --positive ahead|behind  what a growing value means; ahead unless told
  --exposure S  --stamp start|mid|end   what the time stamps mark; mid unless told
The model
  --drift 0..3|auto     degree of the drift
  --harmonics N|auto    harmonics of the worm, 1 to 12
Output
  --pretty              indented
  --help                this text

Everything that was assumed stands under "warnings". Figures are arc seconds of the axis, seconds and degrees; phases
refer to the first used sample. A figure that cannot be had is null, and a warning names the reason. Faults go to the
standard error in one line, with exit status 2.
`

const STRINGS = [
  'teeth',
  'worm-period',
  'time',
  'ra',
  'dec',
  'worm-angle',
  'unit',
  'scale',
  'declination',
  'positive',
  'on',
  'exposure',
  'stamp',
  'drift',
  'harmonics',
] as const
type Name = (typeof STRINGS)[number]

/** As people write numbers: Number() alone would take “0x10” and blanks. */
const DECIMAL = /^[-+]?(\d+\.?\d*|\.\d+)(e[-+]?\d+)?$/i

/** @throws {CliFault} naming the option and what it takes */
export function parseAnalyseOptions(argv: string[]): AnalyseOptions {
  const { values, positionals } = read(argv)
  const isHelp = values.help === true
  if ((positionals.length !== 1 || positionals[0] === '') && !isHelp) {
    throw new CliFault(
      positionals.length < 2
        ? 'No file was named. Say: npm run --silent analyse -- FILE (--help tells the options)'
        : `One file at a time: got ${positionals.map((name) => `“${name}”`).join(', ')}`,
    )
  }
  const text = (name: Name) => values[name] ?? null
  const number = (name: Name, demand: string, isAllowed: (value: number) => boolean) => {
    const given = text(name)
    if (given === null) return null
    const value = DECIMAL.test(given) ? Number(given) : NaN
    if (!Number.isFinite(value) || !isAllowed(value)) throw unfit(name, demand, given)
    return value
  }
  const oneOf = <Word extends string>(name: Name, words: readonly Word[]): Word | null => {
    const given = text(name)
    if (given === null) return null
    const word = words.find((candidate) => candidate === given)
    if (word === undefined) throw unfit(name, words.join(' or '), given)
    return word
  }
  const isPositive = (value: number) => value > 0
  const isWhole = (value: number) => Number.isInteger(value) && value >= 1 && value <= 100_000

  const teeth = number('teeth', 'a whole number from 1 to 100000', isWhole)
  const wormPeriodSeconds = number('worm-period', 'a number of seconds above 0', isPositive)
  if (teeth !== null && wormPeriodSeconds !== null) {
    throw new CliFault('--teeth and --worm-period both give the period: take one of them')
  }
  const drift = text('drift') === 'auto' ? null : number('drift', '0, 1, 2, 3 or auto', (d) => [0, 1, 2, 3].includes(d))
  const harmonics =
    text('harmonics') === 'auto'
      ? null
      : number('harmonics', 'a whole number from 1 to 12, or auto', (n) => isWhole(n) && n <= 12)
  return {
    file: positionals[0] ?? '',
    isHelp,
    isPretty: values.pretty === true,
    teeth,
    wormPeriodSeconds,
    columns: { time: text('time'), ra: text('ra'), dec: text('dec'), wormAngle: text('worm-angle') },
    unit: oneOf('unit', ['px', 'arcsec', 'ra-seconds']),
    scaleArcsecPerPx: number('scale', 'arc seconds per pixel above 0', isPositive),
    declinationDegrees: number('declination', 'degrees between -89 and 89', (value) => Math.abs(value) < 89),
    positive: oneOf('positive', ['ahead', 'behind']),
    frame: oneOf('on', ['sky', 'axis']),
    exposureSeconds: number('exposure', 'seconds from 0 to 3600', (value) => value >= 0 && value <= 3600),
    stamp: oneOf('stamp', ['start', 'mid', 'end']),
    drift: drift === null ? 'auto' : (drift as 0 | 1 | 2 | 3),
    harmonics: harmonics ?? 'auto',
  }
}

function unfit(name: Name, demand: string, given: string): CliFault {
  return new CliFault(`--${name} takes ${demand}: got “${given}”`)
}

function read(argv: string[]) {
  try {
    return parseArgs({
      args: withNegativesJoined(argv),
      allowPositionals: true,
      options: {
        help: { type: 'boolean' },
        pretty: { type: 'boolean' },
        ...(Object.fromEntries(STRINGS.map((name) => [name, { type: 'string' }])) as Record<Name, { type: 'string' }>),
      },
    })
  } catch (error) {
    const message =
      error instanceof Error ? error.message.split('\n')[0].replace(/\.? To specify.*$/, '') : String(error)
    throw new CliFault(`${message} (--help tells the options)`)
  }
}

/** `--declination -12` means a number, though it looks like an option to the parser. */
function withNegativesJoined(argv: string[]): string[] {
  const joined: string[] = []
  for (const arg of argv) {
    const before = joined.at(-1)
    const isNumber = /^-(\d|\.\d)/.test(arg)
    if (isNumber && before?.startsWith('--') && !before.includes('=')) joined[joined.length - 1] = `${before}=${arg}`
    else joined.push(arg)
  }
  return joined
}
