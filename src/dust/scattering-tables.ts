import { type Allocate, allocatePrivate } from '../math/allocate.js'
import { makeSamplingTable, type SamplingTable, sampleBin } from '../math/cdf.js'
import type { ScatteringMatrix } from './scattering-matrix.js'

/** Steps of a table from forward to backward; even. */
export const TABLE_STEPS = 1024
/** Numbers a node: s11, s12, s33, s34. */
export const ELEMENTS = 4

const HALF = TABLE_STEPS / 2
/** Nodes a unit of the sine of half the angle to the nearer pole. */
const SCALE = HALF / Math.SQRT1_2

/**
 * Scattering laws as packets use them, as flat arrays that all threads share. The nodes are even in sin(angle / 2) in the
 * forward half and in cos(angle / 2) in the backward half, so that peaks of both kinds are resolved to 0.16 deg; between nodes
 * the elements are linear in that variable, and s11 of that very interpolation is 1 over 4 pi sr.
 */
export interface ScatteringTables {
  laws: number
  /** laws x (TABLE_STEPS + 1) x ELEMENTS, per sr. */
  elements: Float64Array
  /** One row a law, one bin a step: where scattering goes. */
  steps: SamplingTable
  /** By law: s22 / s11, which is 1 for spheres and 0 for a law that says nothing about polarisation: it leaves none. */
  keeps: Float64Array
  /** Some law polarises. */
  polarising: boolean
}

/** Place among the nodes of the scattering angle of a cosine in [-1, 1]. */
export function tablePosition(cosine: number): number {
  return cosine >= 0 ? SCALE * Math.sqrt(0.5 * (1 - cosine)) : TABLE_STEPS - SCALE * Math.sqrt(0.5 * (1 + cosine))
}

/** Cosine of the scattering angle at a place among the nodes. */
export function cosineAt(place: number): number {
  const sine = (place <= HALF ? place : TABLE_STEPS - place) / SCALE
  return place <= HALF ? 1 - 2 * sine * sine : 2 * sine * sine - 1
}

export const S11 = 0
export const S12 = 1

/** An element of a law at a cosine, per sr. */
export function elementAt({ elements }: ScatteringTables, law: number, element: number, cosine: number): number {
  const place = tablePosition(cosine)
  const node = place < TABLE_STEPS ? place | 0 : TABLE_STEPS - 1
  const at = (law * (TABLE_STEPS + 1) + node) * ELEMENTS + element
  return elements[at] + (place - node) * (elements[at + ELEMENTS] - elements[at])
}

/** The largest s11 of a law, per sr. */
export function peakOf({ elements }: ScatteringTables, law: number): number {
  let peak = 0
  for (let node = 0; node <= TABLE_STEPS; node++)
    peak = Math.max(peak, elements[(law * (TABLE_STEPS + 1) + node) * ELEMENTS + S11])
  return peak
}

/** Place of a scattering angle drawn from a law: exactly from the interpolation that `elementAt` gives. */
export function drawPlace({ elements, steps }: ScatteringTables, law: number, uniform: () => number): number {
  const step = sampleBin(steps, law, uniform())
  const at = (law * (TABLE_STEPS + 1) + step) * ELEMENTS
  const low = elements[at]
  const rise = elements[at + ELEMENTS] - low
  // Solid angle grows with the distance from the pole, so the density in the step is a product of two straight lines.
  const forward = step < HALF
  const start = forward ? step : TABLE_STEPS - step
  const slope = forward ? 1 : -1
  const top = Math.max(low, low + rise) * Math.max(start, start + slope)
  let t = uniform()
  while (uniform() * top >= (low + rise * t) * (start + slope * t)) t = uniform()
  return step + t
}

/** Tables of the laws at one wavelength. */
export function scatteringTables(matrices: ScatteringMatrix[], allocate: Allocate = allocatePrivate): ScatteringTables {
  const laws = matrices.length
  const nodes = TABLE_STEPS + 1
  const elements = new Float64Array(allocate(8 * laws * nodes * ELEMENTS))
  const keeps = new Float64Array(allocate(8 * laws))
  const weights = new Float64Array(laws * TABLE_STEPS)
  matrices.forEach((matrix, law) => {
    const start = law * nodes * ELEMENTS
    fillElements(matrix, elements.subarray(start, start + nodes * ELEMENTS))
    let total = 0
    for (let step = 0; step < TABLE_STEPS; step++) {
      const solid = solidAngle(elements[start + step * ELEMENTS], elements[start + (step + 1) * ELEMENTS], step)
      weights[law * TABLE_STEPS + step] = solid
      total += solid
    }
    for (let i = start; i < start + nodes * ELEMENTS; i++) elements[i] /= total
    keeps[law] = matrix.s12.some((value) => value !== 0) || matrix.s33.some((value) => value !== 0) ? 1 : 0
  })
  const steps = makeSamplingTable(weights, laws, TABLE_STEPS, allocate)
  return { laws, elements, steps, keeps, polarising: matrices.some(({ s12 }) => s12.some((value) => value !== 0)) }
}

/** Integral over the solid angle of a step of what is linear between its nodes: v = sin or cos of half the angle, d mu = 4 v dv. */
function solidAngle(first: number, second: number, step: number): number {
  const forward = step < HALF
  const [near, far, start] = forward ? [first, second, step] : [second, first, TABLE_STEPS - step - 1]
  const mean = start * (near + far) * 0.5 + (near + 2 * far) / 6
  return (8 * Math.PI * mean) / (SCALE * SCALE)
}

/** The elements at every node, linear in the angle between those given. */
function fillElements({ angles, s11, s12, s33, s34 }: ScatteringMatrix, out: Float64Array): void {
  const last = angles.length - 1
  const nodes = tableAngles()
  let i = 0
  for (let node = 0; node <= TABLE_STEPS; node++) {
    const angle = nodes[node]
    while (i < last - 1 && angles[i + 1] <= angle) i++
    const share = Math.min(1, Math.max(0, (angle - angles[i]) / (angles[i + 1] - angles[i])))
    const between = (values: Float64Array) => values[i] + share * (values[i + 1] - values[i])
    out.set([s11, s12, s33, s34].map(between), node * ELEMENTS)
  }
}

/** The angles of the nodes, rad: a matrix given at these goes into the tables as it is. */
export function tableAngles(): Float64Array {
  return Float64Array.from({ length: TABLE_STEPS + 1 }, (_, node) => {
    const sine = (node <= HALF ? node : TABLE_STEPS - node) / SCALE
    return node <= HALF ? 2 * Math.asin(sine) : Math.PI - 2 * Math.asin(sine)
  })
}
