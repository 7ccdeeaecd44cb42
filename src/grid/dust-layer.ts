import { gaussLegendre } from '../math/quadrature.js'
import { polarMean } from '../shapes/polar-mean.js'
import type { Shape } from '../shapes/shape.js'

/** What the placing of walls has to know of a dust component. */
export interface DustLayer {
  shape: Shape
  /** g/cm3 for a relative density of 1. */
  scale: number
  /**
   * Extinction opacity (cm2/g) by which optical depths are resolved: the largest of the wavelengths that matter, about
   * the peak of the stellar spectrum. Longer wavelengths then find their own optical depths resolved further in.
   */
  extinction: number
}

/** Range of cos(theta), 0 <= from < to <= 1. */
export interface PolarRange {
  from: number
  to: number
}

const TWO_POINTS = gaussLegendre(2)

/** Extinction a cm at radius r (cm), averaged over a range of polar angle. */
export function extinctionAt(layers: DustLayer[], r: number, { from, to }: PolarRange): number {
  let sum = 0
  for (const { shape, scale, extinction } of layers) sum += scale * extinction * polarMean(shape, r, from, to, TWO_POINTS)
  return sum
}

/** The polar cells above the midplane, from the midplane up; one range when every shape is spherical. */
export function upperRanges(layers: DustLayer[], cosTheta: Float64Array): PolarRange[] {
  const whole = [{ from: 0, to: 1 }]
  if (layers.every(({ shape }) => shape.symmetry === 'spherical')) return whole
  const ranges: PolarRange[] = []
  for (let k = cosTheta.length - 2; k >= 0; k--) {
    if (cosTheta[k] > 0) ranges.push({ from: Math.max(0, cosTheta[k + 1]), to: cosTheta[k] })
  }
  return fewer(ranges)
}

/** More ranges say nothing more about where radial walls should be, but take time as their square. */
const MOST_RANGES = 100

/** Neighbours put together until few enough are left; the one next to the midplane stays as it is. */
function fewer(ranges: PolarRange[]): PolarRange[] {
  if (ranges.length <= MOST_RANGES) return ranges
  const [midplane, ...others] = ranges
  const step = Math.ceil(others.length / (MOST_RANGES - 1))
  const count = Math.ceil(others.length / step)
  const joined = Array.from({ length: count }, (_, i) => ({
    from: others[i * step].from,
    to: others[Math.min(others.length, (i + 1) * step) - 1].to
  }))
  return [midplane, ...joined]
}
