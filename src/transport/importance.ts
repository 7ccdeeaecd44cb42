import { sphericalOf } from '../grid/cells.js'
import type { ScatterLaunch, ScatterMedium } from './scatter-medium.js'

/** Smallest importance: what stands so deep that less than this of its light leaves is treated alike. */
const LEAST = 1e-200

/**
 * About how much of the light at a place leaves in the end, by radial cell in one dimension: what diffuse light loses on its way
 * straight out. A guide for roulette and splitting alone.
 */
export function importanceOf({ cells, extinction, scattering, asymmetry, walls }: ScatterMedium): Float64Array {
  const { r } = sphericalOf(walls)
  const importance = new Float64Array(cells)
  // What a depth leaves of the moments of the light over directions, by their order.
  const left = new Float64Array(4)
  let above = 0
  for (let cell = cells - 1; cell >= 0; cell--) {
    left.fill(extinction[cell])
    for (let law = 0; law < asymmetry.length; law++) {
      for (let order = 0; order < 4; order++) left[order] -= scattering[law * cells + cell] * asymmetry[law] ** order
    }
    const depth = Math.min(extinction[cell], diffuseExtinction(left)) * (r[cell + 1] - r[cell])
    importance[cell] = Math.max(LEAST, Math.exp(-above - 0.5 * depth))
    above += depth
  }
  return importance
}

/**
 * How fast diffuse light fades deep in dust, cm-1: the smaller root of the P3 equations, common practice;
 * within 1 % of the exact root for albedo 0.6 and asymmetry 0.5. `left`: extinction - scattering x (Legendre moment of the law) for the orders 0 to 3.
 */
function diffuseExtinction(left: Float64Array): number {
  const [h0, h1, h2, h3] = left.map((value, order) => (2 * order + 1) * value)
  if (!(h3 > 0)) return 0
  const b = h2 + (9 * h0 * h1) / h3 + 4 * h0
  const c = Math.max(0, h0 * h1 * h2)
  return Math.sqrt((2 * c) / (b + Math.sqrt(Math.max(0, b * b - (36 * c) / h3))))
}

/** Mean importance of the light of a source where it sets out, that of a point star where it is first scattered. */
export function meanImportance(launch: ScatterLaunch, importance: Float64Array): number {
  const cells = importance.length
  if (launch.kind === 'ambient') return importance[cells - 1]
  if (launch.kind === 'sphere-star') return importance[0]
  if (launch.kind === 'free-star') throw new TypeError('a star off the centre of shells')
  let sum = 0
  let before = 0
  for (let cell = 0; cell < cells; cell++) {
    const cumulative = launch.kind === 'dust' ? launch.cells.cumulative[cell] : -Math.expm1(-launch.opticalDepth[cell + 1])
    sum += (cumulative - before) * importance[cell]
    before = cumulative
  }
  return sum / before
}
