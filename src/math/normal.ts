/**
 * ln of the probability that a standard normal number is less than x. Below -6 by the continued fraction of Mills' ratio (DLMF
 * 7.9.1), above by a series for the integral from 0 (DLMF 7.6.2).
 */
export function logNormalBelow(x: number): number {
  if (x < -6) {
    let fraction = -x
    for (let n = 60; n > 0; n--) fraction = -x + n / fraction
    return -0.5 * x * x - 0.5 * Math.log(2 * Math.PI) - Math.log(fraction)
  }
  if (x > 9) return 0
  let term = x
  let sum = x
  for (let n = 1; Math.abs(term) > 1e-17 * Math.abs(sum); n++) {
    term *= (x * x) / (2 * n + 1)
    sum += term
  }
  return Math.log(0.5 + sum * (Math.exp(-0.5 * x * x) / Math.sqrt(2 * Math.PI)))
}
