import type { AnalysisQuery, AuditQuery, CorrectionQuery, ProjectQuery, RunQuery } from '@/lib/schemas/lists'
import { formatCount } from '@/lib/units'
import { thingWords } from './audit-words'

export interface Noun {
  one: string
  many: string
}

/** What a narrowed list shows: “12 of 340 runs: recorded with the mount’s correction off”. */
export function shownSentence(
  { total, all }: { total: number; all: number },
  noun: Noun,
  words: readonly string[],
): string {
  const counts = words.length === 0 ? formatCount(total) : `${formatCount(total)} of ${formatCount(all)}`
  const what = `${counts} ${all === 1 ? noun.one : noun.many}`
  return words.length === 0 ? what : `${what}: ${words.join(', ')}`
}

const textWords = (q: string) => (q.trim() === '' ? [] : [`with “${q.trim()}”`])

const dayFormat = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'long', year: 'numeric', timeZone: 'UTC' })
const dayWords = (day: string) => dayFormat.format(new Date(`${day}T00:00:00Z`))

/** “from 1 November 2026 to 30 November 2026”; the sentence’s verb comes before it. */
function spanWords(verb: string, { from, to }: { from?: string; to?: string }): string[] {
  if (from === undefined && to === undefined) return []
  if (from === to && from !== undefined) return [`${verb} on ${dayWords(from)}`]
  if (to === undefined) return [`${verb} since ${dayWords(from ?? '')}`]
  return [from === undefined ? `${verb} until ${dayWords(to)}` : `${verb} from ${dayWords(from)} to ${dayWords(to)}`]
}

/** The words for a choice, or none where nothing is chosen. */
const choice = <Value extends string>(value: Value | undefined, words: Record<Value, string>) =>
  value === undefined ? [] : [words[value]]

export function runFilterWords(query: RunQuery): string[] {
  return [
    ...textWords(query.q),
    ...choice(query.correction, {
      off: 'recorded with the mount’s correction off',
      on: 'recorded with the mount’s correction on',
      unknown: 'recorded with the mount’s correction unknown',
    }),
    ...choice(query.side, {
      east: 'on the east side of the pier',
      west: 'on the west side of the pier',
      unknown: 'on an unknown side of the pier',
    }),
    ...choice(query.sense, { proven: 'with the sense proven', assumed: 'with the sense only assumed' }),
    ...choice(query.state, { read: 'read', unread: 'not read yet' }),
    ...spanWords('recorded', query),
  ]
}

export function analysisFilterWords(query: AnalysisQuery, runName: string | null): string[] {
  return [
    ...textWords(query.q),
    ...(query.runId === undefined ? [] : [runName === null ? 'of a run that is not there' : `of the run “${runName}”`]),
    ...choice(query.worm, { with: 'with a figure for the worm', without: 'without a figure for the worm' }),
  ]
}

export function correctionFilterWords(query: CorrectionQuery): string[] {
  return [
    ...textWords(query.q),
    ...choice(query.kind, { 'stand-alone': 'standing alone', addition: 'added to the table in the mount' }),
    ...choice(query.sense, { proven: 'from a proven sense', assumed: 'from a sense that is only assumed' }),
  ]
}

export function projectFilterWords(query: ProjectQuery): string[] {
  return [
    ...textWords(query.q),
    ...choice(query.role, {
      owner: 'that you own',
      editor: 'in which you are an editor',
      viewer: 'in which you are a viewer',
    }),
    ...choice(query.archived === 'no' ? undefined : query.archived, {
      only: 'archived',
      too: 'the archived ones among them',
    }),
  ]
}

export function auditFilterWords(query: AuditQuery, personName: string | null): string[] {
  return [
    ...textWords(query.q),
    ...(query.person === undefined ? [] : [`by ${personName ?? 'a person who is no longer here'}`]),
    ...(query.thing === undefined ? [] : [`about ${thingWords(query.thing)}`]),
    ...spanWords('done', query),
  ]
}
