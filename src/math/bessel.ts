/** Beyond this argument the asymptotic series is exact to rounding. */
const FAR = 25
/** Points of the trapezoidal rule: its error is J_64(x), below 1e-15 for every x up to FAR. */
const POINTS = 32
const MOST_TERMS = 30

/** Bessel function of the first kind J_0(x), to about 1e-15. */
export function besselJ0(x: number): number {
  const size = Math.abs(x)
  if (size > FAR) return asymptotic(0, size)
  // J_0(x) = (1/pi) int_0^pi cos(x sin t) dt (Abramowitz & Stegun 1964, 9.1.18).
  let sum = 0
  for (let k = 0; k < POINTS; k++) sum += Math.cos(x * SINES[k])
  return sum / POINTS
}

/** Bessel function of the first kind J_1(x), to about 1e-15. */
export function besselJ1(x: number): number {
  const size = Math.abs(x)
  if (size > FAR) return Math.sign(x) * asymptotic(1, size)
  // J_1(x) = (1/pi) int_0^pi cos(t - x sin t) dt (9.1.21); the part in cos(t) cancels.
  let sum = 0
  for (let k = 0; k < POINTS; k++) sum += SINES[k] * Math.sin(x * SINES[k])
  return sum / POINTS
}

/** 2 J_1(x) / x: 1 at the origin. */
export function jinc(x: number): number {
  return Math.abs(x) < 1e-5 ? 1 - (x * x) / 8 : (2 * besselJ1(x)) / x
}

/** Both halves of the period (0, pi) are alike, so half of it is enough. */
const SINES = Float64Array.from({ length: POINTS }, (_, k) => Math.sin((Math.PI * (k + 0.5)) / (2 * POINTS)))

/** Hankel's expansion (Abramowitz & Stegun 1964, 9.2.5), cut at its smallest term. */
function asymptotic(order: number, x: number): number {
  const mu = 4 * order * order
  let term = 1
  let even = 1
  let odd = 0
  for (let k = 1; k < MOST_TERMS; k++) {
    term *= (mu - (2 * k - 1) ** 2) / (k * 8 * x)
    if (k % 2 === 1) odd += (k % 4 === 1 ? 1 : -1) * term
    else even += (k % 4 === 2 ? -1 : 1) * term
    if (Math.abs(term) < 1e-17) break
  }
  const angle = x - (order / 2 + 0.25) * Math.PI
  return Math.sqrt(2 / (Math.PI * x)) * (even * Math.cos(angle) - odd * Math.sin(angle))
}
