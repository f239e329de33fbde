/** What a stressed part is about, so that a screen can colour it: the worm, another line, or a limit that is passed. */
export type Emphasis = 'worm' | 'line' | 'limit'

export interface FindingPart {
  text: string
  emphasis: Emphasis | null
}

/** A sentence in parts; joined, the texts read as plain English with a full stop where one belongs. */
export type Finding = FindingPart[]

export const worm = (text: string): FindingPart => ({ text, emphasis: 'worm' })
export const line = (text: string): FindingPart => ({ text, emphasis: 'line' })
export const limit = (text: string): FindingPart => ({ text, emphasis: 'limit' })

/** Template tag: finding`The run covers ${worm('6.0 turns')} of the worm.` */
export function finding(strings: TemplateStringsArray, ...values: (string | FindingPart | Finding)[]): Finding {
  const parts: Finding = []
  strings.forEach((text, index) => {
    append(parts, [{ text, emphasis: null }])
    if (index < values.length) append(parts, asFinding(values[index]))
  })
  return parts
}

export function joinFindings(findings: readonly Finding[], separator = ' '): Finding {
  const parts: Finding = []
  findings.forEach((each, index) => {
    if (index > 0) append(parts, [{ text: separator, emphasis: null }])
    append(parts, each)
  })
  return parts
}

/** The sentence without its emphasis: for titles, alternatives of pictures, and tests. */
export function findingText(parts: Finding): string {
  return parts.map(({ text }) => text).join('')
}

function asFinding(value: string | FindingPart | Finding): Finding {
  if (typeof value === 'string') return [{ text: value, emphasis: null }]
  return Array.isArray(value) ? value : [value]
}

/** Puts parts behind others, melting neighbours of one emphasis together and leaving empty ones out. */
function append(parts: Finding, added: Finding): void {
  for (const part of added) {
    if (part.text === '') continue
    const last = parts.at(-1)
    if (last && last.emphasis === part.emphasis) last.text += part.text
    else parts.push({ ...part })
  }
}
