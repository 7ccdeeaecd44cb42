/** A number drawn from the normal distribution with mean 0 and variance 1 (Box & Muller 1958). */
export function drawNormal(random: () => number): number {
  return Math.sqrt(-2 * Math.log(random())) * Math.cos(2 * Math.PI * random())
}

/** Mean above which Poisson counts come by transformed rejection. */
const MANY = 10

/**
 * A count drawn from the Poisson distribution of that mean: by multiplication of uniform numbers where it is small, otherwise by
 * transformed rejection (Hoermann 1993, Insurance: Mathematics and Economics 12, 39, algorithm PTRS). Exact at every mean.
 */
export function drawPoisson(mean: number, random: () => number): number {
  if (!(mean > 0)) return 0
  if (mean < MANY) {
    const limit = Math.exp(-mean)
    let count = 0
    for (let product = random(); product > limit; product *= random()) count++
    return count
  }
  const b = 0.931 + 2.53 * Math.sqrt(mean)
  const a = -0.059 + 0.02483 * b
  const vr = 0.9277 - 3.6224 / (b - 2)
  const logMean = Math.log(mean)
  for (;;) {
    const u = random() - 0.5
    const v = random()
    const us = 0.5 - Math.abs(u)
    const count = Math.floor(((2 * a) / us + b) * u + mean + 0.43)
    if (us >= 0.07 && v <= vr) return count
    if (count < 0 || (us < 0.013 && v > us)) continue
    const inverseAlpha = 1.1239 + 1.1328 / (b - 3.4)
    if (Math.log((v * inverseAlpha) / (a / (us * us) + b)) <= count * logMean - mean - logFactorial(count)) return count
  }
}

/** ln(n!), by Stirling's series from 10 on (Abramowitz & Stegun 1964, 6.1.41). */
function logFactorial(n: number): number {
  if (n < 10) {
    let product = 1
    for (let i = 2; i <= n; i++) product *= i
    return Math.log(product)
  }
  const x = n + 1
  return (x - 0.5) * Math.log(x) - x + 0.5 * Math.log(2 * Math.PI) + 1 / (12 * x) - 1 / (360 * x ** 3) + 1 / (1260 * x ** 5)
}
