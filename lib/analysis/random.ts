/** Repeatable random numbers; the seed is stored with every result that used them. */
export interface RandomSource {
  /** The next 32-bit output, an integer in [0, 2³²). */
  nextUint32(): number
  /** Uniform in [0, 1) with 53 bits, from two outputs x, y: ((x≫5)·2²⁶ + (y≫6))/2⁵³. */
  uniform(): number
  /** Integer in [0, count): ⌊U·count⌋. */
  index(count: number): number
  /** Standard normal by Box & Muller (1958), Ann. Math. Stat. 29, 610: r cos 2πU₂, then r sin 2πU₂, r = √(−2 ln(1 − U₁)). */
  normal(): number
}

export const DEFAULT_SEED = 12345

const rotateLeft = (x: number, bits: number) => ((x << bits) | (x >>> (32 - bits))) >>> 0

/** Four words of state from one seed by splitmix32, whose finaliser is that of MurmurHash3. */
function expandSeed(seed: number): [number, number, number, number] {
  let counter = seed >>> 0
  const next = () => {
    counter = (counter + 0x9e3779b9) >>> 0
    let x = counter
    x = Math.imul(x ^ (x >>> 16), 0x85ebca6b)
    x = Math.imul(x ^ (x >>> 13), 0xc2b2ae35)
    return (x ^ (x >>> 16)) >>> 0
  }
  return [next(), next(), next(), next()]
}

/**
 * xoshiro128** 1.1, seeded through splitmix32.
 *
 * @param seed an integer; its low 32 bits are used
 * @throws {RangeError} if the seed is not an integer
 * @see Blackman & Vigna (2021), ACM Trans. Math. Softw. 47(4), 36
 */
export function createRandom(seed: number = DEFAULT_SEED): RandomSource {
  if (!Number.isInteger(seed)) throw new RangeError(`seed must be an integer: got ${seed}`)
  return createRandomFromState(expandSeed(seed))
}

/** The same generator from an explicit state of four 32-bit words, not all zero. */
export function createRandomFromState(state: readonly [number, number, number, number]): RandomSource {
  if (state.every((word) => word >>> 0 === 0)) throw new RangeError('state must not be all zero: got 0, 0, 0, 0')
  let [s0, s1, s2, s3] = state.map((word) => word >>> 0)
  let spareNormal: number | null = null

  function nextUint32(): number {
    const output = Math.imul(rotateLeft(Math.imul(s1, 5), 7), 9) >>> 0
    const shifted = s1 << 9
    s2 ^= s0
    s3 ^= s1
    s1 ^= s2
    s0 ^= s3
    s2 ^= shifted
    s3 = rotateLeft(s3, 11)
    return output
  }

  function uniform(): number {
    const high = nextUint32() >>> 5
    const low = nextUint32() >>> 6
    return (high * 2 ** 26 + low) / 2 ** 53
  }

  function normal(): number {
    if (spareNormal !== null) {
      const value = spareNormal
      spareNormal = null
      return value
    }
    const radius = Math.sqrt(-2 * Math.log(1 - uniform()))
    const angle = 2 * Math.PI * uniform()
    spareNormal = radius * Math.sin(angle)
    return radius * Math.cos(angle)
  }

  return { nextUint32, uniform, index: (count) => Math.floor(uniform() * count), normal }
}
