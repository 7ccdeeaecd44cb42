/**
 * Index i of the interval xs[i] <= x < xs[i + 1] of increasing `xs` (two values or more), found by bisection.
 * A value outside gets the first or the last interval; so does NaN.
 */
export function bracket(xs: ArrayLike<number>, x: number): number {
  let low = 0
  let high = xs.length - 1
  while (high - low > 1) {
    const middle = (low + high) >> 1
    if (xs[middle] <= x) low = middle
    else high = middle
  }
  return low
}

/** Piecewise linear through (xs, ys), xs increasing; the nearest value outside. */
export function interpolateLinear(xs: ArrayLike<number>, ys: ArrayLike<number>, x: number): number {
  const last = xs.length - 1
  if (x <= xs[0]) return ys[0]
  if (x >= xs[last]) return ys[last]
  const i = bracket(xs, x)
  return ys[i] + ((x - xs[i]) / (xs[i + 1] - xs[i])) * (ys[i + 1] - ys[i])
}

/**
 * Piecewise power law through (xs, ys), xs positive and increasing, ys >= 0; linear in an interval where either end is zero;
 * the nearest value outside.
 */
export function interpolateLogLog(xs: ArrayLike<number>, ys: ArrayLike<number>, x: number): number {
  const last = xs.length - 1
  if (x <= xs[0]) return ys[0]
  if (x >= xs[last]) return ys[last]
  const i = bracket(xs, x)
  if (ys[i] > 0 && ys[i + 1] > 0) {
    return ys[i] * (ys[i + 1] / ys[i]) ** (Math.log(x / xs[i]) / Math.log(xs[i + 1] / xs[i]))
  }
  return ys[i] + ((x - xs[i]) / (xs[i + 1] - xs[i])) * (ys[i + 1] - ys[i])
}
