import { withoutCommentMark } from './text-lines'

const PAIR = /^\s*([\p{L}][^=:]{0,59}?)\s*[=:]\s*(\S.*?)\s*$/su
const MAX_PAIRS = 100

/** `key = value` and `key: value` pairs in the lines above the data; the first of equal keys counts. */
export function readMetadata(preamble: string[]): Record<string, string> {
  const pairs = new Map<string, string>()
  for (const line of preamble) {
    const text = withoutCommentMark(line)
    const isList = (text.match(/=/g)?.length ?? 0) > 1
    for (const part of isList ? text.split(/[,;\t]/) : [text.replace(/[,;\t]+$/, '')]) {
      const pair = PAIR.exec(part)
      if (pair && pairs.size < MAX_PAIRS && !pairs.has(pair[1]))
        pairs.set(pair[1], pair[2].replace(/^"(.*)"$/, '$1').slice(0, 500))
    }
  }
  return Object.fromEntries(pairs)
}
