import type { RunColumns } from '@/lib/analysis/types'

/*
 * The columns of one run as bytes, little-endian throughout:
 *   0  4 bytes  "TWRC"
 *   4  uint16   version, 1
 *   6  uint16   flags: 1 declination follows, 2 worm angle follows, 4 the start is known
 *   8  uint32   row count N
 *  12  uint32   0
 *  16  float64  start in ms since 1970 (UTC), 0 where it is not known
 *  24  float64 × N for time, displacement, then declination and worm angle where flagged
 * Every NaN is written as 0x7ff8000000000000, so equal columns give equal bytes and a hash of them names the samples.
 */

const MAGIC = [0x54, 0x57, 0x52, 0x43]
const VERSION = 1
const HEADER_BYTES = 24
const [HAS_DECLINATION, HAS_WORM_ANGLE, HAS_START] = [1, 2, 4]

export interface UnpackedColumns {
  columns: RunColumns
  /** Milliseconds since 1970 (UTC), null where it is not known. */
  startedAtMs: number | null
}

/**
 * The columns as bytes in the layout above. Equal input gives equal bytes.
 *
 * @throws {RangeError} if the columns differ in length or the start is not finite
 */
export function packColumns(columns: RunColumns, startedAtMs: number | null): Uint8Array {
  const { timeSeconds, displacement, declinationDisplacement, wormAngleDegrees } = columns
  const written = [timeSeconds, displacement, declinationDisplacement, wormAngleDegrees].filter(
    (column) => column !== null,
  )
  const rowCount = timeSeconds.length
  for (const column of written) {
    if (column.length !== rowCount)
      throw new RangeError(`columns must be equally long: got ${rowCount} and ${column.length}`)
  }
  if (startedAtMs !== null && !Number.isFinite(startedAtMs))
    throw new RangeError(`startedAtMs must be finite: got ${startedAtMs}`)
  const bytes = new Uint8Array(HEADER_BYTES + written.length * rowCount * 8)
  const view = new DataView(bytes.buffer)
  bytes.set(MAGIC)
  view.setUint16(4, VERSION, true)
  const flags =
    (declinationDisplacement ? HAS_DECLINATION : 0) |
    (wormAngleDegrees ? HAS_WORM_ANGLE : 0) |
    (startedAtMs === null ? 0 : HAS_START)
  view.setUint16(6, flags, true)
  view.setUint32(8, rowCount, true)
  view.setFloat64(16, startedAtMs ?? 0, true)
  let offset = HEADER_BYTES
  for (const column of written) {
    for (let i = 0; i < rowCount; i++, offset += 8) {
      if (Number.isNaN(column[i])) view.setBigUint64(offset, 0x7ff8000000000000n, true)
      else view.setFloat64(offset, column[i], true)
    }
  }
  return bytes
}

/**
 * The columns again, to the bit.
 *
 * @throws {RangeError} if the bytes are no packed columns of a known version or their length does not fit their row count
 */
export function unpackColumns(bytes: Uint8Array): UnpackedColumns {
  if (bytes.length < HEADER_BYTES || MAGIC.some((byte, i) => bytes[i] !== byte)) {
    throw new RangeError(`these ${bytes.length} bytes are not packed columns: they do not begin with TWRC`)
  }
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength)
  const version = view.getUint16(4, true)
  if (version !== VERSION) throw new RangeError(`packed columns must be of version ${VERSION}: got ${version}`)
  const flags = view.getUint16(6, true)
  if (flags > 7) throw new RangeError(`flags of packed columns must be at most 7: got ${flags}`)
  const rowCount = view.getUint32(8, true)
  const columnCount = 2 + (flags & HAS_DECLINATION ? 1 : 0) + (flags & HAS_WORM_ANGLE ? 1 : 0)
  const expected = HEADER_BYTES + columnCount * rowCount * 8
  if (bytes.length !== expected) {
    throw new RangeError(
      `${columnCount} packed columns of ${rowCount} rows must have ${expected} bytes: got ${bytes.length}`,
    )
  }
  let offset = HEADER_BYTES
  const take = () => {
    const column = new Float64Array(rowCount)
    for (let i = 0; i < rowCount; i++, offset += 8) column[i] = view.getFloat64(offset, true)
    return column
  }
  const columns = {
    timeSeconds: take(),
    displacement: take(),
    declinationDisplacement: flags & HAS_DECLINATION ? take() : null,
    wormAngleDegrees: flags & HAS_WORM_ANGLE ? take() : null,
  }
  return { columns, startedAtMs: flags & HAS_START ? view.getFloat64(16, true) : null }
}
