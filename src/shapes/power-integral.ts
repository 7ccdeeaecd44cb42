/**
 * Integral of x^p from a to b, 0 <= a <= b; infinite when it diverges at a = 0.
 * With n = p + 1 and y = n ln(b/a) it is a^n ln(b/a) (e^y - 1)/y, which keeps full relative accuracy for b close to a
 * (as far as b - a is known) and for n close to 0; written from the larger end so that it does not overflow.
 */
export function powerIntegral(a: number, b: number, p: number): number {
  const n = p + 1
  if (a === 0) return b === 0 ? 0 : n > 0 ? b ** n / n : Number.POSITIVE_INFINITY
  const logRatio = Math.log1p((b - a) / a)
  const y = Math.abs(n) * logRatio
  return (n > 0 ? b : a) ** n * logRatio * oneMinusExpOver(y)
}

/** (1 - e^-y)/y, continued to 1 at y = 0. */
export function oneMinusExpOver(y: number): number {
  return y === 0 ? 1 : -Math.expm1(-y) / y
}
