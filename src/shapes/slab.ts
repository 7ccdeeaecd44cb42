import { type FreeShape, noDetails } from './shape.js'

/** Uniform box about the origin, `width` along x and y, `thickness` along z (cm). Relative density 1. */
export function slab(thickness: number, width: number): FreeShape {
  const [a, c] = [0.5 * width, 0.5 * thickness]
  return {
    symmetry: 'none',
    relativeDensity: (x, y, z) => (Math.abs(x) <= a && Math.abs(y) <= a && Math.abs(z) <= c ? 1 : 0),
    totalMass: width * width * thickness,
    column: thickness,
    line: { from: [0, 0, -c], to: [0, 0, c] },
    innerRadius: 0,
    outerRadius: Math.hypot(a, a, c),
    halfSide: Math.max(a, c),
    sphereEdges: [Math.min(a, c), Math.hypot(a, a, c)],
    place: (u, v, w, out) => {
      out[0] = (2 * u - 1) * a
      out[1] = (2 * v - 1) * a
      out[2] = (2 * w - 1) * c
    },
    details: noDetails
  }
}
