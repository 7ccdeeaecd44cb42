import { version } from '../output/version.js'
import type { InputFile } from '../scene/types.js'
import type { Estimator } from './estimator.js'
import { type Findings, findings, micrometres } from './findings.js'
import { type PacketsNeeded, packetsNeeded } from './packets-needed.js'
import { isReached } from './precision.js'
import type { RunResult } from './run-result.js'
import type { PhaseTime } from './stopwatch.js'

/** How a run was made: what its result alone does not tell. */
export interface RunMaking {
  /** ISO 8601 */
  started: string
  workers: number
  estimator: Estimator
  /** Without pictures and plots. */
  dataOnly?: boolean
  /** Pictures of the dust show the edges of its cells. */
  cellEdges?: boolean
}

/** Content of `run.json`. */
export interface RunRecord {
  program: 'motelight'
  version: string
  /** `writing` stands only in the record of a run whose files were never finished. */
  state: 'writing' | 'done' | 'precision-not-reached'
  title: string
  scene: string
  inputs: InputFile[]
  seed: string
  started: string
  workers: number
  estimator: Estimator
  cells: { count: number; dimensions: 1 | 2 | 3; reason: string }
  /** Processor time is that of all threads together. */
  times: Record<'model' | 'dust' | 'light' | 'files', PhaseTime>
  packets: { equilibrium: number; light: { wavelengthUm: number; packets: number }[] }
  /**
   * The last round of the temperatures, erg/s; `ambient` is what ambient fields send into the outer sphere, and `balance` is
   * (emitted - escaped - returned - kept) / emitted. Absent without.
   */
  energy?: { emitted: number; ambient: number; escaped: number; returned: number; kept: number; balance: number }
  equilibrium?: {
    converged: boolean
    rounds: { packets: number; relativeError: number; relativeChange: number; interactions: number }[]
  }
  /** How inner radii were found; absent where none was sought. */
  innerRadii?: { settled: boolean; steps: number; packets: number }
  /** How dust that sublimates was removed from the cells; absent where none may. */
  sublimation?: { settled: boolean; steps: number; packets: number; cells: number }
  precision: {
    /** Relative 1 sigma asked for; null: exactly the packets given. */
    asked: number | null
    reached: boolean
    /** About how many packets it would have taken where they did not suffice. */
    packetsNeeded: PacketsNeeded
    observers: {
      kind: 'camera' | 'spectrum'
      name: string
      /** Relative: 1 sigma of the Monte Carlo part, and the estimated error of placing the rays. */
      wavelengths: { wavelengthUm: number; photonNoise: number; samplingError: number }[]
    }[]
  }
  found: Findings
  warnings: string[]
  /** Relative to the folder. */
  files: string[]
}

/** The record of a finished run; `files` and the time of writing them come from the writer. */
export function runRecord(
  result: RunResult,
  making: RunMaking,
  warnings: string[],
  written: { files: string[]; time: PhaseTime }
): RunRecord {
  const { model, equilibrium, innerRadii, sublimation, lightPackets, precision } = result
  const { scene } = model
  const { estimator, started, workers } = making
  const reached = isReached(result)
  return {
    program: 'motelight',
    version,
    state: reached ? 'done' : 'precision-not-reached',
    title: scene.title,
    scene: scene.file,
    inputs: scene.inputs,
    seed: scene.seed,
    started,
    workers,
    estimator,
    cells: { count: model.cells, dimensions: model.dimensions, reason: model.reason },
    times: { ...result.times, files: written.time },
    packets: {
      equilibrium: equilibrium?.packets ?? 0,
      light: lightPackets.map(({ wavelength, packets }) => ({ wavelengthUm: micrometres(wavelength), packets }))
    },
    ...(equilibrium && {
      energy: { ...equilibrium.budget, balance: balanceOf(equilibrium.budget) },
      equilibrium: {
        converged: equilibrium.reached,
        rounds: equilibrium.rounds.map(({ packets, error, change, interactions }) => ({
          packets,
          relativeError: error,
          relativeChange: change,
          interactions
        }))
      }
    }),
    ...(innerRadii && {
      innerRadii: { settled: innerRadii.settled, steps: innerRadii.steps, packets: innerRadii.packets }
    }),
    ...(sublimation && {
      sublimation: {
        settled: sublimation.settled,
        steps: sublimation.steps,
        packets: sublimation.packets,
        cells: sublimation.gone.reduce((sum, value) => sum + value, 0)
      }
    }),
    precision: {
      asked: scene.effort.precision,
      reached,
      packetsNeeded: packetsNeeded(result),
      observers: precision.map(({ kind, name, wavelengths, photonNoise, samplingError }) => ({
        kind,
        name,
        wavelengths: wavelengths.map((wavelength, k) => ({
          wavelengthUm: micrometres(wavelength),
          photonNoise: photonNoise[k],
          samplingError: samplingError[k]
        }))
      }))
    },
    found: findings(result),
    warnings,
    files: written.files
  }
}

function balanceOf({ emitted, escaped, returned, kept }: NonNullable<RunResult['equilibrium']>['budget']): number {
  return (emitted - escaped - returned - kept) / emitted
}
