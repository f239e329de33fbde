import { binaryFault, emptyFault, tooLargeFault } from './faults'
import { MAX_FILE_BYTES } from './limits'
import type { ImportFault } from './types'

/** What a file is by its first bytes. Only delimited text is read yet; a reader for another kind is added in parse-table.ts. */
export type FileKind = 'delimited-text' | 'gzip' | 'fits' | 'other-binary'

interface Signature {
  kind: FileKind
  /** With its article, as it stands in a message. */
  name: string
  bytes: number[]
}

const ascii = (text: string) => [...text].map((letter) => letter.charCodeAt(0))

const SIGNATURES: Signature[] = [
  { kind: 'gzip', name: 'a gzip archive', bytes: [0x1f, 0x8b] }, // RFC 1952, 2.3.1
  { kind: 'fits', name: 'a FITS file', bytes: ascii('SIMPLE  =') }, // FITS 4.0, 4.4.1.1
  { kind: 'other-binary', name: 'a ZIP archive or a spreadsheet workbook', bytes: [0x50, 0x4b, 0x03, 0x04] },
  { kind: 'other-binary', name: 'a PDF document', bytes: ascii('%PDF-') },
  { kind: 'other-binary', name: 'a PNG image', bytes: [0x89, 0x50, 0x4e, 0x47] },
  { kind: 'other-binary', name: 'a JPEG image', bytes: [0xff, 0xd8, 0xff] },
  { kind: 'other-binary', name: 'an SQLite database', bytes: ascii('SQLite format 3') },
]

export function fileKind(bytes: Uint8Array): { kind: FileKind; name: string | null } {
  const match = SIGNATURES.find((signature) => signature.bytes.every((byte, i) => bytes[i] === byte))
  return match ? { kind: match.kind, name: match.name } : { kind: 'delimited-text', name: null }
}

/** Faults of a file as a whole, before any of its text is looked at; null when it may be read. */
export function wholeFileFault(bytes: Uint8Array): ImportFault | null {
  if (bytes.length === 0) return emptyFault()
  if (bytes.length > MAX_FILE_BYTES) return tooLargeFault(bytes.length)
  const { kind, name } = fileKind(bytes)
  return kind === 'delimited-text' ? null : binaryFault(name)
}
