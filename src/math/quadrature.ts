export interface QuadratureRule {
  /** Abscissae in (-1, 1), increasing. */
  nodes: Float64Array
  /** Their weights; the sum is 2. */
  weights: Float64Array
}

/**
 * Gauss-Legendre rule of n points, exact for polynomials of degree 2n - 1 (Abramowitz & Stegun 1964, 25.4.29).
 * Roots of P_n by Newton's method from Tricomi's estimate; nodes and weights to about 1e-15.
 */
export function gaussLegendre(n: number): QuadratureRule {
  const nodes = new Float64Array(n)
  const weights = new Float64Array(n)
  for (let i = 0; i < n; i++) {
    let x = -Math.cos((Math.PI * (i + 0.75)) / (n + 0.5))
    let derivative = 1
    for (let step = 0; step < 8; step++) {
      let previous = 1
      let value = x
      for (let k = 2; k <= n; k++) {
        const next = ((2 * k - 1) * x * value - (k - 1) * previous) / k
        previous = value
        value = next
      }
      derivative = (n * (previous - x * value)) / (1 - x * x)
      x -= value / derivative
    }
    nodes[i] = x
    weights[i] = 2 / ((1 - x * x) * derivative * derivative)
  }
  return { nodes, weights }
}

/** Integral of f from a to b by one application of `rule`. */
export function applyRule(rule: QuadratureRule, f: (x: number) => number, a: number, b: number): number {
  const { nodes, weights } = rule
  const half = 0.5 * (b - a)
  const middle = 0.5 * (a + b)
  let sum = 0
  for (let i = 0; i < nodes.length; i++) sum += weights[i] * f(middle + half * nodes[i])
  return half * sum
}

const TEN_POINTS = gaussLegendre(10)
const DEEPEST = 40

/**
 * Integral of f from a to b, by halving intervals until ten-point Gauss-Legendre sums of whole and halves agree to
 * `relativeError` of the integral of |f| known so far (default 1e-10). Endpoints are not evaluated.
 */
export function integrate(f: (x: number) => number, a: number, b: number, relativeError = 1e-10): number {
  const size = Math.abs(applyRule(TEN_POINTS, (x) => Math.abs(f(x)), a, b))
  const refine = (from: number, to: number, whole: number, allowed: number, depth: number): number => {
    const middle = 0.5 * (from + to)
    const left = applyRule(TEN_POINTS, f, from, middle)
    const right = applyRule(TEN_POINTS, f, middle, to)
    const sum = left + right
    const limit = Math.max(allowed, relativeError * Math.abs(sum))
    if (depth === DEEPEST || Math.abs(sum - whole) <= limit) return sum
    return refine(from, middle, left, 0.5 * allowed, depth + 1) + refine(middle, to, right, 0.5 * allowed, depth + 1)
  }
  return refine(a, b, applyRule(TEN_POINTS, f, a, b), relativeError * size, 0)
}
