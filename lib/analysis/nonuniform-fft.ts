import { complexFft, nextPowerOfTwo, realFft } from './fft'
import { gaussLegendre } from './special-functions'

/** Cells over which a sample is spread. */
const KERNEL_WIDTH = 12
/** At least; the length is a power of two, so that it is often more. */
const OVERSAMPLING = 1.4

/** Sharpness of the kernel that suits an oversampling σ, 0.97πw(1 − 1/2σ); beyond 2 nothing more is gained. */
function kernelSharpness(size: number, largestIndex: number): number {
  const oversampling = Math.min(2, size / (2 * largestIndex + 1))
  return 0.97 * Math.PI * KERNEL_WIDTH * (1 - 0.5 / oversampling)
}

export interface NonuniformTransform {
  /** Σ g_i e^{−2πi f t_i} and Σ h_i e^{−2πi f t_i} at f = index·stepHz, interleaved re, im from firstIndex on. */
  first: Float64Array
  /** Empty where no second column was given. */
  second: Float64Array
}

/**
 * Fourier sums of two real columns at unevenly spaced times in one complex transform: each sample is spread over twelve
 * cells of a fine even grid with the kernel exp(β(√(1 − z²) − 1)), the grid is transformed, and the kernel's own
 * transform divided out. Accurate to about 1e-9 of Σ|g|.
 *
 * @see Barnett, Magland & af Klinteberg (2019), SIAM J. Sci. Comput. 41, C479
 */
export function nonuniformFft(options: {
  time: Float64Array
  first: Float64Array
  second: Float64Array | null
  stepHz: number
  firstIndex: number
  count: number
}): NonuniformTransform {
  const { time, first, second, stepHz, firstIndex, count } = options
  const largestIndex = firstIndex + count - 1
  const size = nextPowerOfTwo(Math.max(2 * KERNEL_WIDTH, OVERSAMPLING * (2 * largestIndex + 1)))
  const sharpness = kernelSharpness(size, largestIndex)
  const stride = second === null ? 1 : 2
  const grid = new Float64Array(stride * size)
  const half = KERNEL_WIDTH / 2
  for (let i = 0; i < time.length; i++) {
    const turns = time[i] * stepHz
    const position = (turns - Math.floor(turns)) * size
    const start = Math.ceil(position - half)
    const g = first[i]
    const h = second === null ? 0 : second[i]
    for (let cell = start; cell < start + KERNEL_WIDTH; cell++) {
      const z = (cell - position) / half
      const weight = Math.exp(sharpness * (Math.sqrt(Math.max(0, 1 - z * z)) - 1))
      const at = stride * (cell & (size - 1))
      grid[at] += g * weight
      if (stride === 2) grid[at + 1] += h * weight
    }
  }
  const range = { size, firstIndex, count }
  return second === null ? divide(realFft(grid), range) : unpack(complexFft(grid), range)
}

/** The kernel is even, so that its transform needs half of the 24 nodes of the quadrature. */
const HALF_NODES = 12

/** The kernel's transform ∫φ(z) cos(πjwz/n)dz at rising indices j; it serves every transform of one periodogram. */
function kernelTransform(range: { size: number; firstIndex: number; count: number }): Float64Array {
  const { size, firstIndex, count } = range
  const { nodes, weights } = gaussLegendre(2 * HALF_NODES)
  const sharpness = kernelSharpness(size, firstIndex + count - 1)
  const transform = new Float64Array(count)
  for (let k = 0; k < HALF_NODES; k++) {
    const value = 2 * weights[k] * Math.exp(sharpness * (Math.sqrt(1 - nodes[k] * nodes[k]) - 1))
    const step = (Math.PI * KERNEL_WIDTH * nodes[k]) / size
    for (let j = 0; j < count; j++) transform[j] += value * Math.cos(step * (firstIndex + j))
  }
  return transform
}

/** Of the last few ranges: an analysis goes through three again and again. */
const transforms = new Map<string, Float64Array>()
const KEPT_TRANSFORMS = 4

function rememberedKernelTransform(range: { size: number; firstIndex: number; count: number }): Float64Array {
  const key = `${range.size} ${range.firstIndex} ${range.count}`
  const values = transforms.get(key) ?? kernelTransform(range)
  transforms.delete(key)
  transforms.set(key, values)
  if (transforms.size > KEPT_TRANSFORMS) transforms.delete(transforms.keys().next().value as string)
  return values
}

/** One column alone: its transform divided by the kernel's. */
function divide(bins: Float64Array, range: { size: number; firstIndex: number; count: number }): NonuniformTransform {
  const { firstIndex, count } = range
  const first = new Float64Array(2 * count)
  const kernel = rememberedKernelTransform(range)
  for (let j = 0; j < count; j++) {
    const scale = 2 / (KERNEL_WIDTH * kernel[j])
    first[2 * j] = scale * bins[2 * (firstIndex + j)]
    first[2 * j + 1] = scale * bins[2 * (firstIndex + j) + 1]
  }
  return { first, second: new Float64Array(0) }
}

/** Splits Z = G + iH by G(f) = (Z(f) + Z(−f)*)/2, H(f) = (Z(f) − Z(−f)*)/2i and divides by the kernel's transform. */
function unpack(bins: Float64Array, range: { size: number; firstIndex: number; count: number }): NonuniformTransform {
  const { size, firstIndex, count } = range
  const first = new Float64Array(2 * count)
  const second = new Float64Array(2 * count)
  const kernel = rememberedKernelTransform(range)
  for (let j = 0; j < count; j++) {
    const index = firstIndex + j
    const scale = 1 / (KERNEL_WIDTH * kernel[j]) // (w/2)·∫, and the ½ of the split
    const up = 2 * index
    const down = 2 * ((size - index) & (size - 1))
    first[2 * j] = scale * (bins[up] + bins[down])
    first[2 * j + 1] = scale * (bins[up + 1] - bins[down + 1])
    second[2 * j] = scale * (bins[up + 1] + bins[down + 1])
    second[2 * j + 1] = scale * (bins[down] - bins[up])
  }
  return { first, second }
}
