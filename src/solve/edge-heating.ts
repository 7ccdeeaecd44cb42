import { coolingOf, type EmissionTable } from '../dust/emission.js'
import { sphericalOf } from '../grid/cells.js'
import type { Model } from '../model/model.js'
import type { DustTemperatures } from './dust-temperatures.js'
import { GROUPS } from './groups.js'

/** Layers of cells from the inner edge outwards through which the heating is drawn to the edge. */
const LAYERS = 5
/** Cells of a layer count where the density is at least this share of the greatest: the middle of a disk. */
const DENSE = 0.6

/** ln of the energy that dust at its inner edge absorbs and emits, erg/s/g/sr, with the deviation of each group. */
export interface EdgeHeating {
  value: number
  groups: Float64Array
}

/**
 * Heating of a component at its inner radius (cm): a parabola in ln r through the first layers of cells, by least squares, drawn to
 * the edge. NaN where too few layers have a temperature.
 */
export function edgeHeating(model: Model, dust: DustTemperatures, table: EmissionTable, c: number, inner: number): EdgeHeating {
  const { cells, components } = model
  const walls = sphericalOf(model.walls)
  const { density } = components[c]
  const angular = (walls.cosTheta.length - 1) * (walls.phi.length - 1)
  const x: number[] = []
  const layers: EdgeHeating[] = []
  for (let ir = 1; ir < walls.r.length - 1 && layers.length < LAYERS; ir++) {
    const from = 1 + (ir - 1) * angular
    const most = density.subarray(from, from + angular).reduce((a, b) => Math.max(a, b), 0)
    if (most === 0) continue
    const groups = new Float64Array(GROUPS)
    let heating = 0
    let mass = 0
    for (let cell = from; cell < from + angular; cell++) {
      const at = c * cells + cell
      if (density[cell] < DENSE * most || !(dust.sigma[at] >= 0)) continue
      const here = density[cell] * model.volume[cell]
      const absorbed = here * coolingOf(table, dust.temperature[at])
      mass += here
      heating += absorbed
      for (let g = 0; g < GROUPS; g++) groups[g] += absorbed * dust.deviation[at * GROUPS + g]
    }
    if (!(heating > 0)) continue
    const [a, b] = [walls.r[ir], walls.r[ir + 1]]
    // Where the mean of r^-2 over the cell is reached.
    x.push(0.5 * Math.log((a * a + a * b + b * b) / 3) - Math.log(inner))
    layers.push({ value: Math.log(heating / mass), groups: groups.map((value) => value / heating) })
  }
  if (layers.length < 3) return { value: Number.NaN, groups: new Float64Array(GROUPS) }
  const weights = weightsAtZero(x)
  const drawn = (of: (layer: EdgeHeating) => number) => layers.reduce((sum, layer, i) => sum + weights[i] * of(layer), 0)
  return {
    value: drawn(({ value }) => value),
    groups: Float64Array.from({ length: GROUPS }, (_, g) => drawn(({ groups }) => groups[g]))
  }
}

/** Weights of values at `x` in the value at 0 of the parabola fitted to them by least squares. */
function weightsAtZero(x: number[]): number[] {
  // Orthogonal polynomials over the points (Forsythe 1957): the sum over p of p(0) p(x) / sum p^2.
  const last = x[x.length - 1]
  const u = x.map((value) => value / last)
  const dot = (a: number[], b: number[]) => a.reduce((sum, value, i) => sum + value * b[i], 0)
  const weights = new Array(x.length).fill(0)
  const basis: { at: number[]; zero: number }[] = []
  for (let power = 0; power < 3; power++) {
    const at = u.map((value) => value ** power)
    let zero = power === 0 ? 1 : 0
    for (const before of basis) {
      const share = dot(at, before.at) / dot(before.at, before.at)
      before.at.forEach((value, i) => {
        at[i] -= share * value
      })
      zero -= share * before.zero
    }
    basis.push({ at, zero })
    const square = dot(at, at)
    at.forEach((value, i) => {
      weights[i] += (zero * value) / square
    })
  }
  return weights
}
