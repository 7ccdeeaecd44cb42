import { add, complex, divide, multiply, subtract } from '../../math/complex.js'
import type { Material } from '../materials/material.js'

/** Step of the lattice in ln(wavelength) on which materials are looked at: a tenth of the sharpest bands of crystals. */
const STEP = 1e-3
/** Lattice steps between nodes where nothing happens: sixteen a decade. */
const WIDEST = Math.round(Math.LN10 / 16 / STEP)
/** Largest error of interpolation between nodes, in n relative to n and in ln of the absorption of small grains. */
const TOLERANCE = 0.01
/** Absorption (Im (e - 1) / (e + 2)) below which its shape does not matter. */
const FAINT = 1e-6

/**
 * Wavelengths (cm, increasing) from `shortest` to `longest` between which the refractive indices of some materials, and the absorption
 * of small spheres of each, run nearly straight: refractive index against ln(wavelength), absorption in log-log.
 */
export function wavelengthNodes(materials: readonly Material[], shortest: number, longest: number): number[] {
  const last = Math.ceil(Math.log(longest / shortest) / STEP)
  const at = (i: number) => (i === last ? longest : shortest * Math.exp(i * STEP))
  const curves = materials.flatMap((material) => {
    const index = Float64Array.from({ length: last + 1 })
    const absorption = Float64Array.from({ length: last + 1 })
    for (let i = 0; i <= last; i++) {
      const m = material.index(at(i))
      const permittivity = multiply(m, m)
      index[i] = Math.log(0.1 + m.re)
      absorption[i] = Math.log(FAINT + divide(subtract(permittivity, complex(1)), add(permittivity, complex(2))).im)
    }
    return [index, absorption]
  })
  const nodes = [shortest]
  const divideInterval = (from: number, to: number): void => {
    if (to - from > 1 && (to - from > WIDEST || curves.some((curve) => bend(curve, from, to) > TOLERANCE))) {
      const middle = (from + to) >> 1
      divideInterval(from, middle)
      divideInterval(middle, to)
    } else nodes.push(at(to))
  }
  divideInterval(0, last)
  return nodes
}

/** Largest distance of a curve from its chord. */
function bend(curve: Float64Array, from: number, to: number): number {
  const slope = (curve[to] - curve[from]) / (to - from)
  let most = 0
  for (let i = from + 1; i < to; i++) most = Math.max(most, Math.abs(curve[i] - curve[from] - slope * (i - from)))
  return most
}
