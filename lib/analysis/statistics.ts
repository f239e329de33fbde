/** Any numeric column; none of these functions changes its input unless the name ends in InPlace. */
export type Samples = Float64Array | readonly number[]

/** Sum with Neumaier's compensation: exact to a few last bits for millions of terms. */
export function sum(values: Samples): number {
  let total = 0
  let lost = 0
  for (let i = 0; i < values.length; i++) {
    const value = values[i]
    const next = total + value
    lost += Math.abs(total) >= Math.abs(value) ? total - next + value : value - next + total
    total = next
  }
  return total + lost
}

/** Arithmetic mean; 0 for no values, so that nothing downstream meets NaN. */
export function mean(values: Samples): number {
  return values.length === 0 ? 0 : sum(values) / values.length
}

/**
 * Sum of squared deviations from the mean by two passes, with the correction (Σd)²/N of Chan, Golub & LeVeque (1983),
 * Am. Stat. 37, 242, for a mean that is itself rounded.
 */
export function sumOfSquaredDeviations(values: Samples): number {
  const centre = mean(values)
  const squares = new Float64Array(values.length)
  let deviationSum = 0
  for (let i = 0; i < values.length; i++) {
    const deviation = values[i] - centre
    squares[i] = deviation * deviation
    deviationSum += deviation
  }
  return values.length === 0 ? 0 : Math.max(0, sum(squares) - (deviationSum * deviationSum) / values.length)
}

/** Unbiased variance, divisor N − 1; 0 for fewer than two values. */
export function variance(values: Samples): number {
  return values.length < 2 ? 0 : sumOfSquaredDeviations(values) / (values.length - 1)
}

export function standardDeviation(values: Samples): number {
  return Math.sqrt(variance(values))
}

/** Root mean square about zero. */
export function rootMeanSquare(values: Samples): number {
  if (values.length === 0) return 0
  const squares = new Float64Array(values.length)
  for (let i = 0; i < values.length; i++) squares[i] = values[i] * values[i]
  return Math.sqrt(sum(squares) / values.length)
}

/** Largest minus smallest; 0 for no values. */
export function span(values: Samples): number {
  if (values.length === 0) return 0
  let smallest = Infinity
  let largest = -Infinity
  for (let i = 0; i < values.length; i++) {
    const value = values[i]
    if (value < smallest) smallest = value
    if (value > largest) largest = value
  }
  return largest - smallest
}

/** The element that would stand at `rank` after sorting, by Hoare's quickselect; reorders the array. */
function selectInPlace(values: Float64Array, rank: number): number {
  let left = 0
  let right = values.length - 1
  while (left < right) {
    const pivot = values[(left + right) >> 1]
    let i = left
    let j = right
    while (i <= j) {
      while (values[i] < pivot) i++
      while (values[j] > pivot) j--
      if (i <= j) {
        const swap = values[i]
        values[i++] = values[j]
        values[j--] = swap
      }
    }
    if (rank <= j) right = j
    else if (rank >= i) left = i
    else break
  }
  return values[rank]
}

/** Median of finite values, reordering them; the mean of the two middle ones for an even count, 0 for none. */
export function medianInPlace(values: Float64Array): number {
  const count = values.length
  if (count === 0) return 0
  const upper = selectInPlace(values, count >> 1)
  if (count % 2 === 1) return upper
  let lower = -Infinity
  for (let i = 0; i < count >> 1; i++) if (values[i] > lower) lower = values[i]
  return (lower + upper) / 2
}

export function median(values: Samples): number {
  return medianInPlace(Float64Array.from(values))
}

/** Median absolute deviation from the median, not scaled. */
export function medianAbsoluteDeviation(values: Samples): number {
  const centre = median(values)
  return medianInPlace(Float64Array.from(values, (value) => Math.abs(value - centre)))
}

/**
 * Factor from median absolute deviation to the standard deviation of a Gaussian, 1/Φ⁻¹(3/4).
 *
 * @see Hampel (1974), J. Am. Stat. Assoc. 69, 383
 */
export const GAUSSIAN_MAD_FACTOR = 1.482602218505602

/** r₁ = Σ(xᵢ − x̄)(xᵢ₊₁ − x̄)/Σ(xᵢ − x̄)²; 0 for fewer than two or all equal values. */
export function lagOneAutocorrelation(values: Samples): number {
  const centre = mean(values)
  const total = sumOfSquaredDeviations(values)
  if (values.length < 2 || total <= 0) return 0
  const products = new Float64Array(values.length - 1)
  for (let i = 0; i + 1 < values.length; i++) products[i] = (values[i] - centre) * (values[i + 1] - centre)
  return sum(products) / total
}

/** ⌊x + ½⌋, the rounding used everywhere; −0 becomes 0. */
export function roundHalfUp(value: number): number {
  return Math.floor(value + 0.5) + 0
}

/** x − ⌊x⌋ in [0, 1); a result that rounds to 1 is 0. */
export function fraction(value: number): number {
  const rest = value - Math.floor(value)
  return rest >= 1 ? 0 : rest
}

/** An angle brought into [0°, 360°). */
export function normaliseDegrees(degrees: number): number {
  return 360 * fraction(degrees / 360)
}
