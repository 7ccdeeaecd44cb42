import { applyRule, gaussLegendre } from '../math/quadrature.js'
import { henyeyGreenstein } from './phase-function.js'
import type { ScatteringMatrix } from './scattering-matrix.js'
import { tableAngles } from './scattering-tables.js'

/** Scattering matrix of grains much smaller than the wavelength (Bohren & Huffman 1983, eq. 5.4), normalised. */
export function rayleighMatrix(): ScatteringMatrix {
  const angles = tableAngles()
  const unit = 3 / (16 * Math.PI)
  return {
    angles,
    s11: angles.map((angle) => unit * (1 + Math.cos(angle) ** 2)),
    s12: angles.map((angle) => -unit * Math.sin(angle) ** 2),
    s33: angles.map((angle) => unit * 2 * Math.cos(angle)),
    s34: new Float64Array(angles.length)
  }
}

/** A phase function (per sr, of the cosine) that says nothing about polarisation. */
export function scalarMatrix(phase: (cosine: number) => number): ScatteringMatrix {
  const angles = tableAngles()
  const nothing = new Float64Array(angles.length)
  return { angles, s11: angles.map((angle) => phase(Math.cos(angle))), s12: nothing, s33: nothing, s34: nothing }
}

/** Two Henyey-Greenstein laws, of which `first` has the given share of the scattered light. */
export function twoTermMatrix(first: number, second: number, share: number): ScatteringMatrix {
  return scalarMatrix((cosine) => share * henyeyGreenstein(first, cosine) + (1 - share) * henyeyGreenstein(second, cosine))
}

/** The same matrix with s11 1 over 4 pi sr. */
export function normalised(matrix: ScatteringMatrix): ScatteringMatrix {
  const total = 2 * Math.PI * moment(matrix, 0)
  const { angles, s11, s12, s33, s34 } = matrix
  const per = (values: Float64Array) => values.map((value) => value / total)
  return { angles, s11: per(s11), s12: per(s12), s33: per(s33), s34: per(s34) }
}

/** Mean cosine of the scattering angle. */
export function meanCosine(matrix: ScatteringMatrix): number {
  return moment(matrix, 1) / moment(matrix, 0)
}

const RULE = gaussLegendre(6)

/** Integral of s11 cos^n over the cosine, s11 linear in the angle between those given. */
function moment({ angles, s11 }: ScatteringMatrix, power: number): number {
  let sum = 0
  for (let i = 0; i + 1 < angles.length; i++) {
    const rise = (s11[i + 1] - s11[i]) / (angles[i + 1] - angles[i])
    const integrand = (angle: number) => (s11[i] + rise * (angle - angles[i])) * Math.cos(angle) ** power * Math.sin(angle)
    sum += applyRule(RULE, integrand, angles[i], angles[i + 1])
  }
  return sum
}
