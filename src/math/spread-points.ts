/** Point n = 0, 1, ... of a sequence that fills the unit cube evenly (Halton 1960, Numer. Math. 2, 84), three numbers in (0, 1) into `out`. */
export function spreadPoint(n: number, out: Float64Array): void {
  out[0] = radicalInverse(n + 1, 2)
  out[1] = radicalInverse(n + 1, 3)
  out[2] = radicalInverse(n + 1, 5)
}

/** The digits of n in a base, mirrored at the point. */
function radicalInverse(n: number, base: number): number {
  let value = 0
  let scale = 1 / base
  for (let rest = n; rest > 0; rest = Math.floor(rest / base)) {
    value += (rest % base) * scale
    scale /= base
  }
  return value
}
