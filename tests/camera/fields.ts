import type { IntensityField } from '../../src/camera/field.js'
import { EMITTED, RAY_VALUES } from '../../src/camera/ray-values.js'

/** A field known in closed form, with walls where it is told to have them. */
export function fieldOf(intensity: (x: number, y: number) => number, radii: number[], flattening = 1): IntensityField {
  return {
    size: RAY_VALUES,
    sample: (x, y, out) => {
      out.fill(0)
      out[EMITTED] = Math.hypot(x, y) < radii[radii.length - 1] ? intensity(x, y) : 0
    },
    radii: Float64Array.from(radii),
    innermost: radii[0],
    outermost: radii[radii.length - 1],
    flattening
  }
}

/** A bright rim from 1 to 1.001, then a halo as r^-2 to 100, with walls 5 % apart as cells have; and its integral. */
export const rim = {
  field: fieldOf(
    (x, y) => {
      const r = Math.hypot(x, y)
      return r < 1 ? 0 : r < 1.001 ? 1000 : 1 / (r * r)
    },
    [1, 1.001, ...Array.from({ length: 95 }, (_, i) => 1.05 ** (i + 0.5)).filter((r) => r < 99), 100]
  ),
  integral: Math.PI * 1000 * (1.001 ** 2 - 1) + 2 * Math.PI * Math.log(100 / 1.001)
}
