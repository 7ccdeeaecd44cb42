import type { Walk } from '../grid/cells.js'
import type { Vector } from '../scene/types.js'

/** Stars that are spheres, four numbers each: the place of the centre and the square of the radius, cm. */
export function spheresOf(stars: { at: Vector; radius: number }[]): Float64Array {
  return Float64Array.from(stars.filter(({ radius }) => radius > 0).flatMap(({ at, radius }) => [...at, radius * radius]))
}

/** Path to the surface of the nearest star in the way, cm; infinite when there is none. `spheres`: see `spheresOf`. */
export function pathToStar(walk: Walk, spheres: Float64Array): number {
  const { s, b2, x0, y0, z0, ux, uy, uz } = walk
  let nearest = Number.POSITIVE_INFINITY
  for (let i = 0; i < spheres.length; i += 4) {
    const x = spheres[i]
    const y = spheres[i + 1]
    const z = spheres[i + 2]
    // Where along the walk the centre is passed, and at what distance.
    const middle = x * ux + y * uy + z * uz
    if (s >= middle) continue
    const passed2 = b2 - 2 * (x0 * x + y0 * y + z0 * z) + x * x + y * y + z * z - middle * middle
    if (!(passed2 < spheres[i + 3])) continue
    nearest = Math.min(nearest, Math.max(0, middle - Math.sqrt(spheres[i + 3] - passed2) - s))
  }
  return nearest
}
