import type { ScatteringTables } from '../dust/scattering-tables.js'
import { gaussLegendre } from '../math/quadrature.js'
import { FRAME, frameAt } from '../transport/observer-frame.js'
import { FLIGHT_BINS, flightLookup } from '../transport/scatter-medium.js'
import { scatterTowards } from '../transport/scatter-towards.js'
import type { GroupSums } from './group-sums.js'
import { GROUPS } from './groups.js'
import { ANGLE_NODES, type CellVolumes, emptyLight, type ScatteredLight, type ScatteringLaws, spread } from './scattered-light.js'

const WITHIN_BIN = gaussLegendre(2)
/** Azimuths, denser towards the plane of the radius and the observer, where peaked laws peak. */
const AROUND = gaussLegendre(48)

/** How flights become scattered light in spherical shells: for each law, nodes x bins x (I from I, I from Q, Q from I, Q from Q). */
export type TurningMatrices = Float64Array[]

/** The scattering matrix between the planes of the radius, averaged over azimuth and over a bin of flight directions. */
export function turningMatrices(tables: ScatteringTables): TurningMatrices {
  const { edges } = flightLookup()
  return Array.from({ length: tables.laws }, (_, law) => {
    const matrix = new Float64Array(ANGLE_NODES * FLIGHT_BINS * 4)
    for (let node = 0; node < ANGLE_NODES; node++) {
      const towards = 1 - 2 * (node / (ANGLE_NODES - 1)) ** 2
      for (let m = 0; m < FLIGHT_BINS; m++) {
        const high = edges[m]
        const low = edges[m + 1]
        for (let i = 0; i < WITHIN_BIN.nodes.length; i++) {
          const flight = 0.5 * (low + high) + 0.5 * (high - low) * WITHIN_BIN.nodes[i]
          addAzimuths(tables, law, flight, towards, 0.5 * WITHIN_BIN.weights[i], matrix, (node * FLIGHT_BINS + m) * 4)
        }
      }
    }
    return matrix
  })
}

const flying = new Float64Array(FRAME)
const seen = new Float64Array(FRAME)
const fromI = new Float64Array(4)
const fromQ = new Float64Array(4)

/** Adds the mean over azimuth between cosines `mu` and `muOut` with the radius, here the z axis, to four numbers at `to`. */
function addAzimuths(
  tables: ScatteringTables,
  law: number,
  mu: number,
  muOut: number,
  weight: number,
  matrix: Float64Array,
  to: number
): void {
  const acrossIn = Math.sqrt(Math.max(0, 1 - mu * mu))
  const acrossOut = Math.sqrt(Math.max(0, 1 - muOut * muOut))
  frameAt(mu, acrossIn, 1, 0, flying, 0)
  for (let i = 0; i < AROUND.nodes.length; i++) {
    // azimuth = pi t^2
    const t = 0.5 + 0.5 * AROUND.nodes[i]
    const share = weight * 0.5 * AROUND.weights[i] * 2 * t
    const azimuth = Math.PI * t * t
    frameAt(muOut, acrossOut, Math.cos(azimuth), Math.sin(azimuth), seen, 0)
    scatterTowards(tables, law, flying, 0, 0, 0, 0, seen, 0, fromI, 0)
    scatterTowards(tables, law, flying, 0, 1, 0, 0, seen, 0, fromQ, 0)
    matrix[to] += share * fromI[0]
    matrix[to + 1] += share * (fromQ[0] - fromI[0])
    matrix[to + 2] += share * fromI[1]
    matrix[to + 3] += share * (fromQ[1] - fromI[1])
  }
}

/** As `fromFlights`, with polarisation. */
export function fromStokesFlights(
  model: CellVolumes,
  light: ScatteringLaws,
  turning: TurningMatrices,
  flights: GroupSums
): ScatteredLight {
  const { cells, volume } = model
  const total = emptyLight(cells * ANGLE_NODES, 1)
  const q = emptyLight(cells * ANGLE_NODES, 1)
  const mean = new Float64Array(2 * FLIGHT_BINS)
  const deviations = new Float32Array(2 * FLIGHT_BINS * GROUPS)
  for (let cell = 0; cell < cells; cell++) {
    for (let m = 0; m < 2 * FLIGHT_BINS; m++) {
      mean[m] = spread(flights, cell * 2 * FLIGHT_BINS + m, 1 / volume[cell], deviations, m * GROUPS)
    }
    for (let law = 0; law < turning.length; law++) {
      const coefficient = light.scattering[law * cells + cell]
      if (!(coefficient > 0)) continue
      for (let node = 0; node < ANGLE_NODES; node++) {
        const row = node * FLIGHT_BINS * 4
        const at = cell * ANGLE_NODES + node
        addTurned(turning[law], row, 0, coefficient, mean, deviations, total, at)
        addTurned(turning[law], row, 2, coefficient, mean, deviations, q, at)
      }
    }
  }
  return { slots: ANGLE_NODES, polarNodes: 1, ...total, ...(light.tables!.polarising && { polarised: { parts: 1, ...q } }) }
}

/** Adds one Stokes parameter towards a node from those of all flights; its two numbers stand at `part` of each four of the matrix. */
function addTurned(
  matrix: Float64Array,
  row: number,
  part: number,
  coefficient: number,
  mean: Float64Array,
  deviations: Float32Array,
  { value, groups }: Pick<ScatteredLight, 'value' | 'groups'>,
  at: number
): void {
  let sum = 0
  const turned = new Float64Array(GROUPS)
  for (let m = 0; m < FLIGHT_BINS; m++) {
    const i = matrix[row + 4 * m + part]
    const q = matrix[row + 4 * m + part + 1]
    sum += i * mean[2 * m] + q * mean[2 * m + 1]
    const from = 2 * m * GROUPS
    for (let g = 0; g < GROUPS; g++) turned[g] += i * deviations[from + g] + q * deviations[from + GROUPS + g]
  }
  value[at] += coefficient * sum
  for (let g = 0; g < GROUPS; g++) groups[at * GROUPS + g] += coefficient * turned[g]
}
