import { extent } from '../math/stats.js'
import type { ComplexValues } from './fourier.js'

/** The phase round a triangle of baselines, rad. */
export interface ClosurePhase {
  /** Numbers of the baselines, counted from 1; negative where one is passed backwards. */
  baselines: [number, number, number]
  observed: number
  expected: number
  /** 1 sigma of the run's Monte Carlo part, and of the instrument's noise, at most pi. */
  sigma: number
  noise: number
}

/** Baselines that differ by less than this part of the longest are the same. */
const SAME = 1e-6

/**
 * Closure phases of all triangles that three of the baselines form, whichever way each is passed: arg(V1 V2 V3)
 * (Jennison 1958, MNRAS 118, 276).
 */
export function closurePhases(
  baselines: [number, number][],
  observed: ComplexValues,
  expected: ComplexValues,
  sigma: Float64Array,
  noise: number
): ClosurePhase[] {
  const [, longest] = extent(baselines.map(([east, north]) => Math.hypot(east, north)))
  const step = SAME * longest
  const key = (east: number, north: number) => `${Math.round(east / step)} ${Math.round(north / step)}`
  const places = new Map(baselines.map(([east, north], i) => [key(east, north), i]))
  const phase = ({ re, im }: ComplexValues, i: number) => Math.atan2(im[i], re[i])
  const size = (i: number) => Math.hypot(expected.re[i], expected.im[i])
  const closures: ClosurePhase[] = []
  const error = (corners: number[], one: (index: number) => number) =>
    Math.min(Math.PI, Math.hypot(...corners.map((index) => one(index) / size(index))))
  const close = (i: number, j: number, k: number, second: number, third: number) => {
    const round = (values: ComplexValues) => turn(phase(values, i) + second * phase(values, j) + third * phase(values, k))
    closures.push({
      baselines: [i + 1, second * (j + 1), third * (k + 1)],
      observed: round(observed),
      expected: round(expected),
      sigma: error([i, j, k], (index) => sigma[index]),
      noise: error([i, j, k], () => noise)
    })
  }
  for (let i = 0; i < baselines.length; i++) {
    for (let j = i + 1; j < baselines.length; j++) {
      for (const second of [1, -1]) {
        const east = baselines[i][0] + second * baselines[j][0]
        const north = baselines[i][1] + second * baselines[j][1]
        for (const third of [1, -1]) {
          const k = places.get(key(-third * east, -third * north))
          if (k !== undefined && k > j) close(i, j, k, second, third)
        }
      }
    }
  }
  return closures
}

/** An angle in (-pi, pi]. */
function turn(angle: number): number {
  return Math.atan2(Math.sin(angle), Math.cos(angle))
}
