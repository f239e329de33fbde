import type { ExcludedSpan, GearStage, Recipe, SpectrumWindow, TableSettings, WindowName } from '@/lib/analysis/types'
import { recipeSchema } from './recipe'

/*
 * A recipe in the address bar: one readable parameter per setting, and only those that differ from a base recipe that both
 * sides know (the run's own, or the saved analysis's). Numbers are written in full, so reading gives the same recipe back.
 */

interface AddressField {
  key: string
  write: (recipe: Recipe) => string
  /** The recipe with this setting taken from the text, or null where the text says nothing that could be meant. */
  read: (recipe: Recipe, text: string) => Recipe | null
}

const NONE = 'none'

const FIELDS: AddressField[] = [
  conversionText('unit', 'displacementUnit'),
  conversionNumber('scale', 'imageScaleArcsecPerPx'),
  conversionNumber('scale-error', 'imageScaleUncertaintyPercent'),
  conversionNumber('dec', 'declinationDegrees'),
  conversionNumber('dec-error', 'declinationUncertaintyDegrees'),
  conversionText('frame', 'frame'),
  conversionText('positive', 'positiveMeans'),
  conversionText('sense', 'senseBasis'),
  conversionNumber('frame-exposure', 'exposureSeconds'),
  conversionText('stamp', 'timeStamp'),
  {
    key: 'leave-out',
    write: (recipe) => recipe.excludedSpans.map(writeSpan).join(',') || NONE,
    read: (recipe, text) => {
      const excludedSpans = readList(text, readSpan)
      return excludedSpans && { ...recipe, excludedSpans }
    },
  },
  flag('stray-filter', 'isStrayPointFilterOn'),
  {
    key: 'drift',
    write: (recipe) => String(recipe.driftDegree),
    read: (recipe, text) => {
      const degree = readAutoOrNumber(text)
      return degree === null ? null : { ...recipe, driftDegree: degree as Recipe['driftDegree'] }
    },
  },
  {
    key: 'wheel',
    write: (recipe) => writeNumber(recipe.driveTrain.wheelTeeth),
    read: (recipe, text) => {
      const wheelTeeth = readNumber(text)
      return wheelTeeth === undefined ? null : { ...recipe, driveTrain: { ...recipe.driveTrain, wheelTeeth } }
    },
  },
  {
    key: 'starts',
    write: (recipe) => String(recipe.driveTrain.wormStarts),
    read: (recipe, text) => {
      const wormStarts = readNumber(text) ?? null
      return wormStarts === null ? null : { ...recipe, driveTrain: { ...recipe.driveTrain, wormStarts } }
    },
  },
  {
    key: 'stages',
    write: (recipe) => recipe.driveTrain.stages.map(writeStage).join(',') || NONE,
    read: (recipe, text) => {
      const stages = readList(text, readStage)
      return stages && { ...recipe, driveTrain: { ...recipe.driveTrain, stages } }
    },
  },
  {
    key: 'period',
    write: (recipe) => recipe.wormPeriod,
    read: (recipe, text) => ({ ...recipe, wormPeriod: text as Recipe['wormPeriod'] }),
  },
  number('period-seconds', 'typedPeriodSeconds'),
  {
    key: 'harmonics',
    write: (recipe) => String(recipe.harmonicCount),
    read: (recipe, text) => {
      const harmonicCount = readAutoOrNumber(text)
      return harmonicCount === null ? null : { ...recipe, harmonicCount }
    },
  },
  flag('lines', 'isLineSearchOn'),
  number('chance', 'chanceLevel'),
  {
    key: 'window',
    write: ({ spectrumWindow }) =>
      typeof spectrumWindow === 'string' ? spectrumWindow : `${spectrumWindow.kind}:${spectrumWindow.beta}`,
    read: (recipe, text) => {
      const spectrumWindow = readWindow(text)
      return spectrumWindow && { ...recipe, spectrumWindow }
    },
  },
  number('tolerance', 'toleranceSkyArcsec'),
  number('exposure', 'pictureExposureSeconds'),
  tableNumber('bins', 'binCount'),
  tableText('table', 'quantity'),
  tableText('table-unit', 'unit'),
  tableText('meaning', 'meaning'),
  tableText('angle', 'angleDirection'),
  {
    key: 'zero',
    write: ({ table }) =>
      table.origin.kind === 'index-time' ? `index:${table.origin.timeSeconds}` : table.origin.kind,
    read: (recipe, text) => {
      const origin = readOrigin(text)
      return origin && { ...recipe, table: { ...recipe.table, origin } }
    },
  },
  tableNumber('offset', 'offsetDegrees'),
  {
    key: 'orders',
    write: ({ table }) => (table.orders === 'default' ? 'default' : table.orders.join('.') || NONE),
    read: (recipe, text) => {
      const orders = readOrders(text)
      return orders && { ...recipe, table: { ...recipe.table, orders } }
    },
  },
  tableNumber('gain', 'gain'),
  tableText('playback', 'playback'),
]

/** Every parameter name that a recipe may put into the address. */
export const RECIPE_ADDRESS_KEYS: readonly string[] = FIELDS.map((field) => field.key)

/** The settings that differ from `base`, as parameters in a fixed order. */
export function writeRecipeAddress(recipe: Recipe, base: Recipe): [string, string][] {
  return FIELDS.flatMap(({ key, write }) => (write(recipe) === write(base) ? [] : [[key, write(recipe)]]))
}

/** `search` (with or without its ?) with its recipe parameters replaced; other parameters stay where they are. */
export function withRecipeAddress(search: string, recipe: Recipe, base: Recipe): string {
  const kept = [...new URLSearchParams(search)].filter(([key]) => !RECIPE_ADDRESS_KEYS.includes(key))
  const parts = [...kept, ...writeRecipeAddress(recipe, base)]
  return parts.length === 0
    ? ''
    : `?${parts.map(([key, value]) => `${escapeText(key)}=${escapeText(value)}`).join('&')}`
}

export interface AddressReading {
  recipe: Recipe
  /** Parameters that could not be understood; their settings are those of the base. */
  refused: string[]
}

/** `base` with every setting that the address names; a parameter that would make the recipe invalid is refused by itself. */
export function readRecipeAddress(search: string, base: Recipe): AddressReading {
  const parameters = new URLSearchParams(search)
  let recipe = base
  const refused: string[] = []
  for (const { key, read } of FIELDS) {
    const value = parameters.get(key)
    if (value === null) continue
    const parsed = recipeSchema.safeParse(read(recipe, value))
    if (parsed.success) recipe = parsed.data
    else refused.push(key)
  }
  return { recipe, refused }
}

/** Leaves what an address may hold in clear: ":" and "," stay readable, "&", "#", "+" and blanks do not pass. */
function escapeText(value: string): string {
  return encodeURIComponent(value).replace(/%2C/g, ',').replace(/%3A/g, ':')
}

function writeNumber(value: number | null): string {
  return value === null ? NONE : String(value)
}

/** A number, null for "none", undefined for anything else. */
function readNumber(value: string): number | null | undefined {
  if (value === NONE) return null
  return /^-?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i.test(value) ? Number(value) : undefined
}

function readAutoOrNumber(value: string): 'auto' | number | null {
  return value === 'auto' ? value : (readNumber(value) ?? null)
}

function readList<T>(value: string, read: (part: string) => T | null): T[] | null {
  if (value === NONE) return []
  const parts = value.split(',').map(read)
  return parts.every((part) => part !== null) ? parts : null
}

function writeSpan(span: ExcludedSpan): string {
  return `${span.startSeconds}..${span.endSeconds}`
}

function readSpan(value: string): ExcludedSpan | null {
  const [startSeconds, endSeconds, ...rest] = value.split('..').map(readNumber)
  return typeof startSeconds === 'number' && typeof endSeconds === 'number' && rest.length === 0
    ? { startSeconds, endSeconds }
    : null
}

/** gear:60:22:name or belt:60:22:90:name; a comma within a name is written as %2C once more. */
function writeStage(stage: GearStage): string {
  const name = encodeURIComponent(stage.name)
  return stage.kind === 'belt'
    ? `belt:${stage.drivenTeeth}:${stage.drivingTeeth}:${stage.beltTeeth}:${name}`
    : `gear:${stage.drivenTeeth}:${stage.drivingTeeth}:${name}`
}

function readStage(value: string): GearStage | null {
  const [kind, ...parts] = value.split(':')
  const name = decodeName(parts.pop() ?? '')
  const teeth = parts.map(Number)
  if (name === null || teeth.some((count) => !Number.isInteger(count))) return null
  if (kind === 'belt' && teeth.length === 3) {
    return { kind: 'belt', name, drivenTeeth: teeth[0], drivingTeeth: teeth[1], beltTeeth: teeth[2] }
  }
  return kind === 'gear' && teeth.length === 2
    ? { kind: 'gear-pair', name, drivenTeeth: teeth[0], drivingTeeth: teeth[1] }
    : null
}

function decodeName(value: string): string | null {
  try {
    return decodeURIComponent(value)
  } catch {
    return null
  }
}

function readOrigin(value: string): TableSettings['origin'] | null {
  if (value === 'run-start' || value === 'worm-angle-column') return { kind: value }
  const timeSeconds = value.startsWith('index:') ? readNumber(value.slice('index:'.length)) : undefined
  return typeof timeSeconds === 'number' ? { kind: 'index-time', timeSeconds } : null
}

/** The name of a window, or kaiser:β; whether there is such a window is for the schema to say. */
function readWindow(value: string): SpectrumWindow | null {
  if (!value.startsWith('kaiser:')) return value as WindowName
  const beta = readNumber(value.slice('kaiser:'.length))
  return typeof beta === 'number' ? { kind: 'kaiser', beta } : null
}

function readOrders(value: string): TableSettings['orders'] | null {
  if (value === 'default') return value
  if (value === NONE) return []
  const orders = value.split('.').map(Number)
  return orders.every((order) => Number.isInteger(order)) ? orders : null
}

type Conversion = Recipe['conversion']

function conversionText(key: string, name: keyof Conversion): AddressField {
  return {
    key,
    write: (recipe) => String(recipe.conversion[name]),
    read: (recipe, value) => ({ ...recipe, conversion: { ...recipe.conversion, [name]: value } }),
  }
}

function conversionNumber(key: string, name: keyof Conversion): AddressField {
  return {
    key,
    write: (recipe) => writeNumber(recipe.conversion[name] as number | null),
    read: (recipe, value) => {
      const parsed = readNumber(value)
      return parsed === undefined ? null : { ...recipe, conversion: { ...recipe.conversion, [name]: parsed } }
    },
  }
}

function number(
  key: string,
  name: 'typedPeriodSeconds' | 'chanceLevel' | 'toleranceSkyArcsec' | 'pictureExposureSeconds',
): AddressField {
  return {
    key,
    write: (recipe) => writeNumber(recipe[name]),
    read: (recipe, value) => {
      const parsed = readNumber(value)
      return parsed === undefined ? null : ({ ...recipe, [name]: parsed } as Recipe)
    },
  }
}

function flag(key: string, name: 'isStrayPointFilterOn' | 'isLineSearchOn'): AddressField {
  return {
    key,
    write: (recipe) => (recipe[name] ? 'on' : 'off'),
    read: (recipe, value) => (value === 'on' || value === 'off' ? { ...recipe, [name]: value === 'on' } : null),
  }
}

function tableText(key: string, name: 'quantity' | 'unit' | 'meaning' | 'angleDirection' | 'playback'): AddressField {
  return {
    key,
    write: (recipe) => recipe.table[name],
    read: (recipe, value) => ({ ...recipe, table: { ...recipe.table, [name]: value } as TableSettings }),
  }
}

function tableNumber(key: string, name: 'binCount' | 'offsetDegrees' | 'gain'): AddressField {
  return {
    key,
    write: (recipe) => String(recipe.table[name]),
    read: (recipe, value) => {
      const parsed = readNumber(value)
      return typeof parsed === 'number' ? { ...recipe, table: { ...recipe.table, [name]: parsed } } : null
    },
  }
}
