const mostDecades = 5
const leastRatioForLog = 30
const isolatedPeak = 10
const quantileOfFaint = 0.02

/** How values become colours: from `low` to `high`, linear or in the logarithm. */
export interface Stretch {
  kind: 'linear' | 'logarithmic'
  low: number
  high: number
  brightest: number
  /** Some values lie above `high`. */
  cut: boolean
  /** No value is positive. */
  empty: boolean
}

/**
 * Chooses a stretch from the positive values of an image. A few pixels (1 in 2000, at least 4) that outshine the rest
 * tenfold, such as a star, do not set the scale. Logarithmic, over at most five decades, when the values span more than
 * a factor of 30 or when `logarithmic` asks for it (magnitudes); not below `noise`.
 */
export function chooseStretch(values: Float64Array, logarithmic = false, noise = 0): Stretch {
  const lit = values.filter((value) => value > 0 && Number.isFinite(value)).sort()
  if (lit.length === 0) return { kind: 'linear', low: 0, high: 1, brightest: 0, cut: false, empty: true }
  const brightest = lit[lit.length - 1]
  const few = Math.max(4, Math.floor(values.length / 2000))
  const common = lit[Math.max(0, lit.length - 1 - few)]
  const cut = lit.length > 2 * few && brightest > isolatedPeak * common
  const high = cut ? common : brightest
  const low = Math.max(lit[Math.floor(quantileOfFaint * lit.length)], high / 10 ** mostDecades, Math.min(noise, high))
  if (logarithmic || high > leastRatioForLog * low) {
    return { kind: 'logarithmic', low: low < high ? low : high / 10, high, brightest, cut, empty: false }
  }
  return { kind: 'linear', low: 0, high, brightest, cut, empty: false }
}

/** Where a value lies between the ends of a stretch, 0 to 1; 0 for what is no positive number. */
export function stretched(value: number, { kind, low, high }: Stretch): number {
  if (!(value > 0)) return 0
  const fraction = kind === 'linear' ? (value - low) / (high - low) : Math.log(value / low) / Math.log(high / low)
  return Math.min(1, Math.max(0, fraction))
}
