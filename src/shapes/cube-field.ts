import { bracket } from '../math/interp.js'
import type { DensityCube } from '../scene/types.js'
import { type FreeShape, noDetails } from './shape.js'

/** Density in equal cubes about the origin, `width` (cm) together along x; the same all over each cube. */
export function cubeField({ size: [nx, ny, nz], values }: DensityCube, width: number): FreeShape {
  const side = width / nx
  const [a, b, c] = [0.5 * side * nx, 0.5 * side * ny, 0.5 * side * nz]
  let sum = 0
  for (let i = 0; i < values.length; i++) sum += values[i]

  /** Along z through the centre: the mean of the cubes that meet there. */
  const column = () => {
    const middles = (n: number) => (n % 2 === 0 ? [n / 2 - 1, n / 2] : [(n - 1) / 2])
    const columns = middles(ny).flatMap((j) => middles(nx).map((i) => j * nx + i))
    let total = 0
    for (const at of columns) for (let k = 0; k < nz; k++) total += values[k * nx * ny + at]
    return (total * side) / columns.length
  }
  let sums: Float64Array | undefined
  return {
    symmetry: 'none',
    relativeDensity: (x, y, z) => {
      const i = Math.floor((x + a) / side)
      const j = Math.floor((y + b) / side)
      const k = Math.floor((z + c) / side)
      return i >= 0 && i < nx && j >= 0 && j < ny && k >= 0 && k < nz ? values[(k * ny + j) * nx + i] : 0
    },
    totalMass: sum * side ** 3,
    column: column(),
    line: { from: [0, 0, -c], to: [0, 0, c] },
    innerRadius: 0,
    outerRadius: Math.hypot(a, b, c),
    halfSide: Math.max(a, b, c),
    sphereEdges: [Math.hypot(a, b, c)],
    place: (u, v, w, out) => {
      sums ??= runningSum(values)
      const at = bracket(sums, u * sums[values.length])
      const share = (u * sums[values.length] - sums[at]) / values[at]
      out[0] = ((at % nx) + share) * side - a
      out[1] = ((Math.floor(at / nx) % ny) + v) * side - b
      out[2] = (Math.floor(at / (nx * ny)) + w) * side - c
    },
    details: noDetails
  }
}

/** The sum before each value, and of all. */
export function runningSum(values: ArrayLike<number>): Float64Array {
  const sums = new Float64Array(values.length + 1)
  for (let i = 0; i < values.length; i++) sums[i + 1] = sums[i] + values[i]
  return sums
}
