import { createHash } from 'node:crypto'
import { expect, test } from 'vitest'
import type { RunColumns } from '@/lib/analysis/types'
import { packColumns, unpackColumns } from '@/lib/formats/packed-columns'
import { seededRandom } from './make-file'

function columnsOf(rowCount: number, seed: number, { hasDeclination = false, hasWormAngle = false } = {}): RunColumns {
  const random = seededRandom(seed)
  const column = () =>
    Float64Array.from({ length: rowCount }, () =>
      random() < 0.05 ? NaN : (random() - 0.5) * 10 ** Math.floor(random() * 20),
    )
  return {
    timeSeconds: Float64Array.from({ length: rowCount }, (_, i) => i * 2.5),
    displacement: column(),
    declinationDisplacement: hasDeclination ? column() : null,
    wormAngleDegrees: hasWormAngle ? column() : null,
  }
}

const sha256 = (bytes: Uint8Array) => createHash('sha256').update(bytes).digest('hex')

for (const rowCount of [0, 1, 777]) {
  for (const hasDeclination of [false, true]) {
    for (const hasWormAngle of [false, true]) {
      for (const startedAtMs of [null, 0, -1, 1_952_460_187_250.5]) {
        test(`there and back to the bit: ${rowCount} rows, declination ${hasDeclination}, angle ${hasWormAngle}, start ${startedAtMs}`, () => {
          const columns = columnsOf(rowCount, rowCount + 3, { hasDeclination, hasWormAngle })
          const unpacked = unpackColumns(packColumns(columns, startedAtMs))
          expect(unpacked).toEqual({ columns, startedAtMs })
        })
      }
    }
  }
}

test('the layout is as documented, read with plain arithmetic', () => {
  const bytes = packColumns(
    { ...columnsOf(1, 1), displacement: Float64Array.of(-2), timeSeconds: Float64Array.of(1.5) },
    null,
  )
  expect([...bytes.subarray(0, 24)]).toEqual([
    84, 87, 82, 67, 1, 0, 0, 0, 1, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0,
  ])
  // IEEE 754: 1.5 = 0x3ff8000000000000, −2 = 0xc000000000000000.
  expect([...bytes.subarray(24)]).toEqual([0, 0, 0, 0, 0, 0, 0xf8, 0x3f, 0, 0, 0, 0, 0, 0, 0, 0xc0])
})

test('a hash of the bytes names the samples: equal for equal columns whatever the NaN, else different', () => {
  const columns = columnsOf(50, 5)
  const otherNaN = new Float64Array(columns.displacement)
  const words = new BigUint64Array(otherNaN.buffer)
  const at = otherNaN.findIndex(Number.isNaN)
  words[at] = 0xfff8000000000123n
  expect(Number.isNaN(otherNaN[at])).toBe(true)
  const hash = sha256(packColumns(columns, 1))
  expect(sha256(packColumns({ ...columns, displacement: otherNaN }, 1))).toBe(hash)
  expect(sha256(packColumns(columns, 2))).not.toBe(hash)
  expect(sha256(packColumns({ ...columns, wormAngleDegrees: columns.displacement }, 1))).not.toBe(hash)
  expect(sha256(packColumns({ ...columns, declinationDisplacement: columns.displacement }, 1))).not.toBe(
    sha256(packColumns({ ...columns, wormAngleDegrees: columns.displacement }, 1)),
  )
})

test('bytes inside a larger buffer are read from their own start', () => {
  const packed = packColumns(columnsOf(9, 2), 5)
  const larger = new Uint8Array(packed.length + 7)
  larger.set(packed, 3)
  expect(unpackColumns(larger.subarray(3, 3 + packed.length))).toEqual(unpackColumns(packed))
})

test('bytes that are something else are refused, any one of them', () => {
  const packed = packColumns(columnsOf(20, 4), null)
  expect(() => unpackColumns(new Uint8Array(0))).toThrow(RangeError)
  expect(() => unpackColumns(packed.subarray(0, packed.length - 1))).toThrow('must have 344 bytes: got 343')
  expect(() => unpackColumns(packed.subarray(0, 24))).toThrow(RangeError)
  const changed = (at: number, byte: number) => packed.map((old, i) => (i === at ? byte : old))
  expect(() => unpackColumns(changed(0, 1))).toThrow('do not begin with TWRC')
  expect(() => unpackColumns(changed(4, 2))).toThrow('version 1: got 2')
  expect(() => unpackColumns(changed(6, 8))).toThrow('flags')
  expect(() => unpackColumns(changed(11, 255))).toThrow('must have')
})

test('columns of unequal length and a start that is no number are a caller’s mistake', () => {
  const columns = columnsOf(5, 1)
  expect(() => packColumns({ ...columns, displacement: new Float64Array(4) }, null)).toThrow(
    'equally long: got 5 and 4',
  )
  expect(() => packColumns(columns, NaN)).toThrow(RangeError)
})
