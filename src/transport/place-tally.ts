import { henyeyGreenstein } from '../dust/phase-function.js'
import type { Walk } from '../grid/cells.js'
import { GOLDEN } from '../math/golden.js'
import { NEAR_DIRECTIONS, nearDirections, nearOffset, type Observers, observerCount } from './observers.js'
import type { ScatterMedium } from './scatter-medium.js'

/**
 * Light scattered towards observers at places among cells of three dimensions, in the tally of `tallyTowards`. The direction to such an
 * observer changes along a flight: it is that from a point of each step, so that a cell holds the mean over its points of what each
 * sends to the observer. Cells near to him, which he sees under a large angle, have a tally for each of many directions instead.
 */
export class PlaceTally {
  private readonly count: number
  private readonly first: number
  /** By place: the number of each near cell among them, and where their tally begins. */
  private readonly near: Map<number, number>[]
  private readonly offsets: number[]
  private readonly directions = nearDirections()
  /** Where along a step the point lies. */
  private along = 0

  constructor(
    private readonly medium: ScatterMedium,
    private readonly observers: Observers,
    private readonly tally: Float64Array
  ) {
    this.count = observerCount(observers)
    this.first = observers.directions.length / 3
    this.near = observers.places.map(({ near }) => new Map(Array.from(near, (cell, i) => [cell, i])))
    this.offsets = observers.places.map((_, place) => nearOffset(medium.cells, observers, place))
  }

  /** Adds a step of a walk in its present cell, of weight x path `amount`. */
  add(walk: Walk, step: number, amount: number): void {
    const { count, first, tally } = this
    const { places } = this.observers
    const { cell, ux, uy, uz } = walk
    this.along = (this.along + GOLDEN) % 1
    const s = walk.s + this.along * step
    const x = walk.x0 + s * ux
    const y = walk.y0 + s * uy
    const z = walk.z0 + s * uz
    for (let o = 0; o < places.length; o++) {
      const { at, within } = places[o]
      const dx = at[0] - x
      const dy = at[1] - y
      const dz = at[2] - z
      const distance = Math.sqrt(dx * dx + dy * dy + dz * dz)
      const index = distance < within ? this.near[o].get(cell) : undefined
      if (index === undefined)
        tally[cell * count + first + o] += amount * this.law(cell, (dx * ux + dy * uy + dz * uz) / distance)
      else this.addNear(walk, this.offsets[o] + index * NEAR_DIRECTIONS, amount)
    }
  }

  private addNear({ cell, ux, uy, uz }: Walk, offset: number, amount: number): void {
    const { tally, directions } = this
    for (let d = 0; d < NEAR_DIRECTIONS; d++) {
      const cosine = ux * directions[3 * d] + uy * directions[3 * d + 1] + uz * directions[3 * d + 2]
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
