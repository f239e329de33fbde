/**
 * Reads a number as people type it: a decimal point or comma, a true minus sign, spaces between thousands.
 *
 * @returns the number; null for an empty field; 'not-a-number' for anything else
 */
export function parseNumberText(text: string): number | null | 'not-a-number' {
  const plain = text.replace(/[\s\u2009\u202f]/g, '').replace(/\u2212/g, '-')
  if (plain === '') return null
  const pointed = plain.replace(',', '.')
  if (!/^[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d+)?$/.test(pointed)) return 'not-a-number'
  const value = Number(pointed)
  return Number.isFinite(value) ? value : 'not-a-number'
}

/** The shortest text that reads back as the same number. */
export function numberText(value: number | null): string {
  return value === null ? '' : String(value).replace('-', '\u2212')
}
