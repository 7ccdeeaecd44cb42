import { standardError } from '../math/stats.js'
import { GROUPS } from '../solve/groups.js'
import { Q, RAY_VALUES } from './ray-values.js'

/** Names of the planes: Stokes parameters and their 1 sigma. */
export const STOKES = ['q', 'u', 'v', 'sigmaQ', 'sigmaU', 'sigmaV'] as const

/** Each Stokes parameter with its 1 sigma. */
export const STOKES_PAIRS = [
  ['q', 'sigmaQ'],
  ['u', 'sigmaU'],
  ['v', 'sigmaV']
] as const

/**
 * Stokes parameters in the unit of the intensity or flux that they stand beside, and their 1 sigma; IAU (1974): Q > 0 is an electric
 * vector north-south, U > 0 one from north-east to south-west, V > 0 turns from north through east.
 */
export type StokesPlanes = Record<(typeof STOKES)[number], Float64Array>

export function stokesPlanes(length: number): StokesPlanes {
  const plane = () => new Float64Array(length)
  return { q: plane(), u: plane(), v: plane(), sigmaQ: plane(), sigmaU: plane(), sigmaV: plane() }
}

/** Writes the polarisation of a ray's numbers at `at`; with `parity` -1, of its image in a mirror that leaves north. */
export function putStokes(planes: StokesPlanes, at: number, ray: Float64Array, parity: 1 | -1): void {
  const sigma = (part: number) => standardError(ray.subarray(RAY_VALUES + part * GROUPS, RAY_VALUES + (part + 1) * GROUPS))
  planes.q[at] = ray[Q]
  planes.u[at] = parity * ray[Q + 1]
  planes.v[at] = parity * ray[Q + 2]
  planes.sigmaQ[at] = sigma(0)
  planes.sigmaU[at] = sigma(1)
  planes.sigmaV[at] = sigma(2)
}
