import { azimuthalHenyeyGreenstein } from '../dust/phase-function.js'
import { allocateShared } from '../math/allocate.js'
import { gaussLegendre } from '../math/quadrature.js'
import type { Model } from '../model/model.js'
import type { Vector } from '../scene/types.js'
import { FLIGHT_BINS, flightLookup } from '../transport/scatter-medium.js'
import type { DustLight } from './dust-light.js'
import type { GroupSums } from './group-sums.js'
import { GROUPS } from './groups.js'

/** Nodes in the angle between radius and observer at which the scattered light of spherical shells is known. */
export const ANGLE_NODES = 65

/** Polar angles of observers between which, in two dimensions, the light towards those at any place is interpolated. */
export const POLAR_NODES = 13

/** Their directions, from the z axis to the midplane. */
export function polarDirections(): Vector[] {
  return Array.from({ length: POLAR_NODES }, (_, node) => {
    const angle = (0.5 * Math.PI * node) / (POLAR_NODES - 1)
    return [Math.sin(angle), 0, Math.cos(angle)]
  })
}

/**
 * Emission coefficient of scattered light (erg/s/cm3/Hz/sr) towards one observer, or towards those of several polar angles, as flat arrays
 * that all threads share.
 */
export interface ScatteredLight {
  /** Values a cell: ANGLE_NODES in one dimension, AZIMUTH_BINS in two, 1 in three. */
  slots: number
  /** 1, or directions evenly spaced in polar angle from the z axis to the midplane. */
  polarNodes: number
  /** polarNodes x cells x slots */
  value: Float64Array
  /** polarNodes x cells x slots x GROUPS: deviations of the groups' estimates. */
  groups: Float32Array
  /** Where a law polarises. */
  polarised?: PolarisedPart
  /** Cells near to an observer at a place, whose light is told by direction. */
  near?: NearLight
}

/** Scattered light of some cells in the directions of `nearFrames`: cells x directions, and x GROUPS the groups' deviations. */
export interface NearLight {
  cells: Int32Array
  value: Float64Array
  groups: Float32Array
  /** Where a law polarises. */
  polarised?: PolarisedPart
}

/** What of the cells scattered light is made with. */
export type CellVolumes = Pick<Model, 'cells' | 'volume' | 'dimensions'>

/** What of the dust scattered light is made with. */
export type ScatteringLaws = Pick<DustLight, 'asymmetry' | 'scattering' | 'tables'>

/** Stokes parameters beside I, as ScatteredLight with so many numbers where that has one. */
export interface PolarisedPart {
  /** 1 in one dimension: Q, referred to the radius; else 3: Q, U, V, referred to the projected z axis. */
  parts: 1 | 3
  value: Float64Array
  groups: Float32Array
}

const RULE = gaussLegendre(4)

/** Room for so many values with those of their groups, each of so many parts. */
export function emptyLight(length: number, parts: number): Pick<ScatteredLight, 'value' | 'groups'> {
  return {
    value: new Float64Array(allocateShared(8 * length * parts)),
    groups: new Float32Array(allocateShared(4 * length * parts * GROUPS))
  }
}

/** Mean and deviations over the groups at element `i`, scaled; the mean is returned, the deviations go to `out` at `start`. */
export function spread({ sums, packets }: GroupSums, i: number, scale: number, out: Float32Array, start: number): number {
  let sum = 0
  let all = 0
  for (let g = 0; g < GROUPS; g++) {
    sum += sums[g][i]
    all += packets[g]
  }
  const mean = sum / all
  for (let g = 0; g < GROUPS; g++) out[start + g] = (sums[g][i] / packets[g] - mean) * scale
  return mean * scale
}

/** Scattered light of spherical shells: the light in flight, turned towards the observer by the scattering law. */
export function fromFlights(model: CellVolumes, light: ScatteringLaws, flights: GroupSums): ScatteredLight {
  const { cells, volume } = model
  const { value, groups } = emptyLight(cells * ANGLE_NODES, 1)
  const laws = Array.from(light.asymmetry, turningLaw)
  const mean = new Float64Array(FLIGHT_BINS)
  const deviations = new Float32Array(FLIGHT_BINS * GROUPS)
  const turned = new Float64Array(GROUPS)
  for (let cell = 0; cell < cells; cell++) {
    for (let m = 0; m < FLIGHT_BINS; m++)
      mean[m] = spread(flights, cell * FLIGHT_BINS + m, 1 / volume[cell], deviations, m * GROUPS)
    for (let law = 0; law < laws.length; law++) {
      const coefficient = light.scattering[law * cells + cell]
      if (!(coefficient > 0)) continue
      const matrix = laws[law]
      for (let node = 0; node < ANGLE_NODES; node++) {
        let sum = 0
        turned.fill(0)
        for (let m = 0; m < FLIGHT_BINS; m++) {
          const weight = matrix[node * FLIGHT_BINS + m]
          sum += weight * mean[m]
          for (let g = 0; g < GROUPS; g++) turned[g] += weight * deviations[m * GROUPS + g]
        }
        const at = cell * ANGLE_NODES + node
        value[at] += coefficient * sum
        for (let g = 0; g < GROUPS; g++) groups[at * GROUPS + g] += coefficient * turned[g]
      }
    }
  }
  return { slots: ANGLE_NODES, polarNodes: 1, value, groups }
}

/** Nodes x bins: the law, averaged over azimuth and over a bin of flight directions, for each angle to the observer. */
function turningLaw(g: number): Float64Array {
  const matrix = new Float64Array(ANGLE_NODES * FLIGHT_BINS)
  const { edges } = flightLookup()
  for (let node = 0; node < ANGLE_NODES; node++) {
    const towards = 1 - 2 * (node / (ANGLE_NODES - 1)) ** 2
    for (let m = 0; m < FLIGHT_BINS; m++) {
      // Even in mu within the bin.
      const high = edges[m]
      const low = edges[m + 1]
      let sum = 0
      for (let i = 0; i < RULE.nodes.length; i++) {
        sum +=
          0.5 * RULE.weights[i] * azimuthalHenyeyGreenstein(g, 0.5 * (low + high) + 0.5 * (high - low) * RULE.nodes[i], towards)
      }
      matrix[node * FLIGHT_BINS + m] = sum
    }
  }
  return matrix
}
