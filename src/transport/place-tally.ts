import { henyeyGreenstein } from '../dust/phase-function.js'
import type { Walk } from '../grid/cells.js'
import { FRAME } from './observer-frame.js'
import { NEAR_DIRECTIONS, nearFrames, nearOffset, type Observers, observerCount } from './observers.js'
import type { ScatterMedium } from './scatter-medium.js'
import { StepsSeen } from './steps-seen.js'

/**
 * Light scattered towards observers at places among cells of three dimensions, in the tally of `tallyTowards`. The direction to such an
 * observer changes along a flight: it is that from a point of each step, so that a cell holds the mean over its points of what each
 * sends to the observer. Cells near to him, which he sees under a large angle, have a tally for each of many directions instead.
 */
export class PlaceTally {
  private readonly count: number
  private readonly first: number
  /** By place, where the tally of its near cells begins. */
  private readonly offsets: number[]
  private readonly frames = nearFrames()
  private readonly steps: StepsSeen

  constructor(
    private readonly medium: ScatterMedium,
    observers: Observers,
    private readonly tally: Float64Array
  ) {
    this.count = observerCount(observers)
    this.first = observers.directions.length / 3
    this.steps = new StepsSeen(observers)
    this.offsets = observers.places.map((_, place) => nearOffset(medium.cells, observers, place))
  }

  /** Adds a step of a walk in its present cell, of weight x path `amount`. */
  add(walk: Walk, step: number, amount: number): void {
    const { count, first, tally, steps, offsets } = this
    const { cell, ux, uy, uz } = walk
    steps.take(walk, step)
    for (let o = 0; o < offsets.length; o++) {
      const index = steps.look(o, cell)
      if (index === undefined)
        tally[cell * count + first + o] += amount * this.law(cell, steps.tx * ux + steps.ty * uy + steps.tz * uz)
      else this.addNear(walk, offsets[o] + index * NEAR_DIRECTIONS, amount)
    }
  }

  private addNear({ cell, ux, uy, uz }: Walk, offset: number, amount: number): void {
    const { tally, frames } = this
    for (let d = 0; d < NEAR_DIRECTIONS; d++) {
      const cosine = ux * frames[FRAME * d] + uy * frames[FRAME * d + 1] + uz * frames[FRAME * d + 2]
      tally[offset + d] += amount * this.coefficient(cell) * this.law(cell, cosine)
    }
  }

  /** Scattering coefficient of a cell, cm-1, where there is one law and `law` is without. */
  private coefficient(cell: number): number {
    const { asymmetry, scattering } = this.medium
    return asymmetry.length === 1 ? scattering[cell] : 1
  }

  /** The law, per sr; of several the sum, each with its scattering coefficient, cm-1. */
  private law(cell: number, cosine: number): number {
    const { asymmetry, scattering, cells } = this.medium
    if (asymmetry.length === 1) return henyeyGreenstein(asymmetry[0], cosine)
    let sum = 0
    for (let law = 0; law < asymmetry.length; law++)
      sum += scattering[law * cells + cell] * henyeyGreenstein(asymmetry[law], cosine)
    return sum
  }
}
