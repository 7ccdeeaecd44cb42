const MOST_STEPS = 100_000
const PRECISION = 1e-15

/**
 * Probability that chi-squared with `degrees` degrees of freedom exceeds `value`: the regularised incomplete gamma function
 * Q(degrees/2, value/2), by its series or its continued fraction (DLMF 8.11.4 and 8.9.2; the latter by Lentz's method).
 */
export function chiSquareTail(value: number, degrees: number): number {
  const [a, x] = [degrees / 2, value / 2]
  if (!(x > 0)) return 1
  const scale = Math.exp(a * Math.log(x) - x - logGamma(a))
  if (x < a + 1) {
    let term = 1 / a
    let sum = term
    for (let n = 1; n < MOST_STEPS && term > PRECISION * sum; n++) {
      term *= x / (a + n)
      sum += term
    }
    return 1 - scale * sum
  }
  let b = x + 1 - a
  let c = Number.POSITIVE_INFINITY
  let d = 1 / b
  let fraction = d
  for (let n = 1; n < MOST_STEPS; n++) {
    const step = -n * (n - a)
    b += 2
    d = 1 / (step * d + b)
    c = b + step / c
    const factor = c * d
    fraction *= factor
    if (Math.abs(factor - 1) < PRECISION) break
  }
  return scale * fraction
}

/** ln Gamma(x) for x > 0: Stirling's series (DLMF 5.11.1) beyond 10, reached by the recurrence. */
function logGamma(x: number): number {
  let shift = 0
  let z = x
  for (; z < 10; z++) shift += Math.log(z)
  const z2 = z * z
  const series = (1 / 12 - (1 / 360 - (1 / 1260 - (1 / 1680 - 1 / (1188 * z2)) / z2) / z2) / z2) / z
  return (z - 0.5) * Math.log(z) - z + 0.5 * Math.log(2 * Math.PI) + series - shift
}
