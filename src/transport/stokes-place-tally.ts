import type { Walk } from '../grid/cells.js'
import { FRAME, frameTowards } from './observer-frame.js'
import { NEAR_DIRECTIONS, nearFrames, nearOffset, type Observers, observerCount } from './observers.js'
import type { Polarisation } from './polarisation.js'
import type { ScatterMedium } from './scatter-medium.js'
import { scatterTowards } from './scatter-towards.js'
import { StepsSeen } from './steps-seen.js'

/** As `PlaceTally` for laws in tables, in the tally of `tallyStokesTowards`, of so many `parts` for each number of that. */
export class StokesPlaceTally {
  private readonly count: number
  private readonly first: number
  /** By place, where the tally of its near cells begins. */
  private readonly offsets: number[]
  private readonly near = nearFrames()
  private readonly steps: StepsSeen
  private readonly seen = new Float64Array(FRAME)
  private readonly light = new Float64Array(4)

  constructor(
    private readonly medium: ScatterMedium,
    observers: Observers,
    /** Of the packet. */
    private readonly polarisation: Polarisation,
    private readonly tally: Float64Array,
    private readonly parts: 1 | 4
  ) {
    this.count = observerCount(observers)
    this.first = observers.directions.length / 3
    this.steps = new StepsSeen(observers)
    this.offsets = observers.places.map((_, place) => nearOffset(medium.cells, observers, place))
  }

  /** Adds a step of a walk in its present cell, of weight x path `amount`. */
  add(walk: Walk, step: number, amount: number): void {
    const { count, first, steps, offsets, seen, near } = this
    const { cell } = walk
    steps.take(walk, step)
    for (let o = 0; o < offsets.length; o++) {
      const index = steps.look(o, cell)
      if (index === undefined) {
        frameTowards(steps.tx, steps.ty, steps.tz, seen, 0)
        this.scatter(cell, amount, seen, 0, cell * count + first + o)
      } else {
        const offset = offsets[o] + index * NEAR_DIRECTIONS
        for (let d = 0; d < NEAR_DIRECTIONS; d++) this.scatter(cell, amount, near, d * FRAME, offset + d)
      }
    }
  }

  /** Adds what all laws scatter towards the frame of `frames` that begins at `at`. */
  private scatter(cell: number, amount: number, frames: Float64Array, at: number, to: number): void {
    const { medium, tally, parts, light, polarisation } = this
    const { stokes, frame } = polarisation
    const { scattering, cells, asymmetry } = medium
    for (let law = 0; law < asymmetry.length; law++) {
      const share = amount * scattering[law * cells + cell]
      if (share === 0) continue
      scatterTowards(medium.tables!, law, frame, 0, stokes.q, stokes.u, stokes.v, frames, at, light, 0)
      for (let part = 0; part < parts; part++) tally[to * parts + part] += share * light[part]
    }
  }
}
