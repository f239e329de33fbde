/** The colours of the drafting sheet as the pictures need them; the names are those of the CSS variables. */
export const CHART_COLOR_NAMES = [
  'sheet',
  'card',
  'rule',
  'faint',
  'ink',
  'soft',
  'brass',
  'brass-fill',
  'verdigris',
  'steel',
  'oxide',
  'plum',
] as const

export type ChartColorName = (typeof CHART_COLOR_NAMES)[number]
export type ChartColors = Record<ChartColorName, string>

/** Day, for pictures drawn where no style sheet can be asked: on the server and on paper. */
export const DAY_COLORS: ChartColors = {
  sheet: '#eff2ec',
  card: '#fbfcf8',
  rule: '#d3dad0',
  faint: '#e4e9e1',
  ink: '#16211e',
  soft: '#54625d',
  brass: '#96640c',
  'brass-fill': '#d9a43f',
  verdigris: '#1c6b61',
  steel: '#6b7c86',
  oxide: '#a0432a',
  plum: '#6e3f63',
}

/** #rrggbb with an opacity; other notations are given back as they are. */
export function withAlpha(color: string, alpha: number): string {
  const match = /^#([0-9a-f]{2})([0-9a-f]{2})([0-9a-f]{2})$/i.exec(color.trim())
  if (!match) return color
  const [red, green, blue] = match.slice(1).map((part) => parseInt(part, 16))
  return `rgba(${red},${green},${blue},${alpha})`
}
