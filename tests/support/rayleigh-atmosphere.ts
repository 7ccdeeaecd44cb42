import { gaussLegendre } from '../../src/math/quadrature.js'

/**
 * Light that leaves a conservative half-space which scatters by Rayleigh's law, with a constant net flux and no light from outside
 * (Chandrasekhar 1960, section 68): I_l = q H_l, I_r = H_r (mu + c), in one unit; l is the electric vector in the plane of the normal.
 * The constants are the solution of I_l(1) = I_r(1) and the condition of flux, and q^2 = 2 (1 - c^2).
 */
const q = 0.689891054225
const c = 0.872940528702

const rule = gaussLegendre(64)
const nodes = rule.nodes.map((x) => 0.5 + 0.5 * x)
const weights = rule.weights.map((w) => 0.5 * w)

/** 1 / H(mu) = sqrt(1 - 2 int Psi) + int mu' Psi(mu') H(mu') / (mu + mu') dmu', by iteration (the same book, section 39). */
function hFunction(psi: (mu: number) => number): (mu: number) => number {
  const rest = Math.sqrt(Math.max(0, 1 - 2 * weights.reduce((sum, w, i) => sum + w * psi(nodes[i]), 0)))
  let h = nodes.map(() => 1)
  const at = (mu: number) =>
    1 / (rest + weights.reduce((sum, w, i) => sum + (w * nodes[i] * psi(nodes[i]) * h[i]) / (mu + nodes[i]), 0))
  for (let i = 0; i < 400; i++) h = nodes.map((mu, k) => 0.5 * (h[k] + at(mu)))
  return at
}

const hl = hFunction((mu) => 0.75 * (1 - mu * mu))
const hr = hFunction((mu) => 0.375 * (1 - mu * mu))

/** I and Q = I_r - I_l (> 0: along the limb), at a cosine with the normal. */
export function rayleighAtmosphere(mu: number): { i: number; q: number } {
  const [l, r] = [q * hl(mu), hr(mu) * (mu + c)]
  return { i: l + r, q: r - l }
}
