/**
 * How many sigma Pearson's chi-square of `counts` against `expected` lies above its mean (bins - 1), by the cube-root
 * approximation of Wilson & Hilferty (1931, PNAS 17, 684). Bins expected to be empty must be empty: otherwise Infinity.
 */
export function chiSquareSigmas(counts: ArrayLike<number>, expected: ArrayLike<number>): number {
  let chiSquare = 0
  let freedom = -1
  for (let i = 0; i < counts.length; i++) {
    if (expected[i] > 0) {
      chiSquare += (counts[i] - expected[i]) ** 2 / expected[i]
      freedom++
    } else if (counts[i] > 0) return Number.POSITIVE_INFINITY
  }
  const spread = 2 / (9 * freedom)
  return (Math.cbrt(chiSquare / freedom) - (1 - spread)) / Math.sqrt(spread)
}
