import type { TextLayout } from './types'

type Encoding = TextLayout['encoding']

/** How much of a file is looked at to guess its encoding and layout. */
export const SAMPLE_BYTES = 256 * 1024

/** Length of a byte order mark at the start, and the encoding that it stands for (Unicode 16.0, section 23.8). */
export function byteOrderMark(bytes: Uint8Array): { encoding: Encoding; length: number } | null {
  if (bytes[0] === 0xef && bytes[1] === 0xbb && bytes[2] === 0xbf) return { encoding: 'utf-8', length: 3 }
  if (bytes[0] === 0xff && bytes[1] === 0xfe) return { encoding: 'utf-16le', length: 2 }
  if (bytes[0] === 0xfe && bytes[1] === 0xff) return { encoding: 'utf-16be', length: 2 }
  return null
}

/**
 * Encoding by byte order mark, by the place of zero bytes (UTF-16 of mostly Latin text), by whether the sample is valid
 * UTF-8; Windows-1252 is what remains.
 */
export function guessEncoding(bytes: Uint8Array): Encoding {
  const mark = byteOrderMark(bytes)
  if (mark) return mark.encoding
  const sample = bytes.subarray(0, SAMPLE_BYTES)
  const zeros = [0, 0]
  for (let i = 0; i < sample.length; i++) if (sample[i] === 0) zeros[i & 1]++
  const half = sample.length / 2
  if (half >= 4 && zeros[1] > 0.7 * half && zeros[0] < 0.05 * half) return 'utf-16le'
  if (half >= 4 && zeros[0] > 0.7 * half && zeros[1] < 0.05 * half) return 'utf-16be'
  return isValidUtf8(sample, sample.length < bytes.length) ? 'utf-8' : 'windows-1252'
}

/** Whether the file cannot be text of that encoding: zero bytes, or more than 1 % control characters in the sample. */
export function isBinary(bytes: Uint8Array, encoding: Encoding): boolean {
  if (isUtf16(encoding)) return controlShare(decodeText(bytes.subarray(0, SAMPLE_BYTES & ~1), encoding)) > 0.01
  if (bytes.includes(0)) return true
  return controlShare(decodeText(bytes.subarray(0, SAMPLE_BYTES), encoding)) > 0.01
}

export function isUtf16(encoding: Encoding): boolean {
  return encoding === 'utf-16le' || encoding === 'utf-16be'
}

/** Text of the bytes without their byte order mark; a cut-off last character and undecodable bytes become U+FFFD or vanish. */
export function decodeText(bytes: Uint8Array, encoding: Encoding): string {
  return new TextDecoder(encoding).decode(bytes, { stream: true })
}

/** Bytes that the scanner can walk: ASCII means itself. UTF-16 is written anew as UTF-8; a byte order mark is left out. */
export function toScannableBytes(bytes: Uint8Array, encoding: Encoding): Uint8Array {
  if (isUtf16(encoding)) return new TextEncoder().encode(decodeText(bytes, encoding))
  return byteOrderMark(bytes)?.encoding === 'utf-8' ? bytes.subarray(3) : bytes
}

function isValidUtf8(sample: Uint8Array, isCut: boolean): boolean {
  try {
    new TextDecoder('utf-8', { fatal: true }).decode(sample, { stream: isCut })
    return true
  } catch {
    return false
  }
}

/** Share of characters that no table has: controls other than tab, line ends, form feed and end-of-file, and U+FFFD. */
function controlShare(text: string): number {
  let count = 0
  for (let i = 0; i < text.length; i++) {
    const code = text.charCodeAt(i)
    const isControl =
      code < 32 ? !(code === 9 || code === 10 || code === 12 || code === 13 || code === 26) : code === 127
    if (isControl || code === 0xfffd || code === 0xfffe) count++
  }
  return text.length === 0 ? 0 : count / text.length
}
