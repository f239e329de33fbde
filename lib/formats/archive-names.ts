/** Names that Windows keeps for devices, whatever follows the first point. */
const RESERVED = /^(con|prn|aux|nul|com[0-9¹²³]|lpt[0-9¹²³])(\.|$)/i

/** What some file system refuses in a name, and marks that change how the rest of it is read or shown. */
const UNSAFE = /[<>:"/\\|?*\p{Cc}\p{Zl}\p{Zp}\u200b\u200e\u200f\u202a-\u202e\u2060-\u2069\ufeff]/gu

/** Longest part of a path in UTF-8 bytes: several parts and a folder must fit into 260 characters. */
const MOST_BYTES = 80

function byteLength(text: string): number {
  return new TextEncoder().encode(text).length
}

/** As many whole characters from the start as fit; a family of emoji is one character. */
function cutTo(text: string, mostBytes: number): string {
  let kept = ''
  for (const { segment } of new Intl.Segmenter('en', { granularity: 'grapheme' }).segment(text)) {
    if (byteLength(kept + segment) > mostBytes) break
    kept += segment
  }
  return kept
}

/** A file's name that every common system can write: the same where it can be, with its ending where it must be cut. */
export function safeFileName(name: string): string {
  const plain = name
    .normalize('NFC')
    .replace(UNSAFE, '_')
    .replace(/[. ]+$/u, '')
    .replace(/^ +/u, '')
  const kept = RESERVED.test(plain) ? `_${plain}` : plain
  if (kept === '' || kept === '.' || kept === '..') return 'file'
  if (byteLength(kept) <= MOST_BYTES) return kept
  const ending = /\.[a-z0-9]{1,8}$/i.exec(kept)?.[0] ?? ''
  return `${cutTo(kept.slice(0, kept.length - ending.length), MOST_BYTES - ending.length)}${ending}`
}

/** The name of a folder for the thing with this name, numbered from 1 so that equal names stay apart: `007-first-light`. */
export function numberedFolder(index: number, count: number, name: string): string {
  const words = name
    .normalize('NFC')
    .replace(UNSAFE, ' ')
    .replace(/[\s,;]+/gu, ' ')
    .trim()
    .replaceAll(' ', '-')
  const slug = cutTo(words, MOST_BYTES - 20)
    .replace(/[-.]+$/u, '')
    .replace(/^[-.]+/u, '')
  const number = String(index + 1).padStart(Math.max(3, String(count).length), '0')
  return slug === '' ? number : `${number}-${slug}`
}
