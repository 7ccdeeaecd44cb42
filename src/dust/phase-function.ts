/**
 * Henyey & Greenstein (1941, ApJ 93, 70) scattering law: probability per sr of a scattering angle of cosine `cosine`,
 * normalised to 1 over 4 pi sr; g in (-1, 1) is the mean cosine. g = 0 is isotropic scattering.
 */
export function henyeyGreenstein(g: number, cosine: number): number {
  const a = 1 + g * g - 2 * g * cosine
  return (1 - g * g) / (4 * Math.PI * a * Math.sqrt(a))
}

/**
 * Cosine of a scattering angle drawn from the Henyey-Greenstein law by a uniform u in [0, 1]; grows with u.
 * The inverse of the cumulative law, with numerator and denominator multiplied out so that it holds at g = 0 too.
 */
export function sampleHenyeyGreenstein(g: number, u: number): number {
  const s = 2 * u - 1
  const b = 1 + g * s
  const cosine = ((2 + g * s) * s * (1 + g * g) + g * (3 - g * g)) / (2 * b * b)
  return Math.min(1, Math.max(-1, cosine))
}

/**
 * Henyey-Greenstein law averaged over the azimuth between two directions of polar cosines mu and muPrime, per sr:
 * (1/2 pi) int p(mu muPrime + sqrt(1 - mu^2) sqrt(1 - muPrime^2) cos psi) dpsi. Twice pi times its integral over mu is 1.
 * The mean of (a - b cos psi)^-3/2 is 2 E(m) / (pi (a - b) sqrt(a + b)), m = 2 b / (a + b), with E the complete elliptic integral
 * of the second kind. To about 1e-12 for |g| <= 0.95.
 */
export function azimuthalHenyeyGreenstein(g: number, mu: number, muPrime: number): number {
  const a = 1 + g * g - 2 * g * mu * muPrime
  const b = 2 * Math.abs(g) * Math.sqrt(Math.max(0, (1 - mu * mu) * (1 - muPrime * muPrime)))
  const mean = (2 * completeEllipticE((2 * b) / (a + b))) / (Math.PI * (a - b) * Math.sqrt(a + b))
  return ((1 - g * g) / (4 * Math.PI)) * mean
}

/** E(m), parameter m = k^2 in [0, 1), by the arithmetic-geometric mean (Abramowitz & Stegun 1964, 17.6.3 and 17.6.4). */
function completeEllipticE(m: number): number {
  let a = 1
  let b = Math.sqrt(1 - m)
  let power = 0.5
  let sum = 0.5 * m
  while (a - b > 1e-9 * a) {
    const c = 0.5 * (a - b)
    b = Math.sqrt(a * b)
    a -= c
    power *= 2
    sum += power * c * c
  }
  return (Math.PI * (1 - sum)) / (a + b)
}
