import type { Walk } from '../grid/cells.js'
import { GOLDEN } from '../math/golden.js'
import type { Observers } from './observers.js'

/** The steps of packets as observers at places see them: each step from a point of it, which moves along from step to step. */
export class StepsSeen {
  /** Unit vector from the present point to the observer last looked at. */
  tx = 0
  ty = 0
  tz = 0
  /** By place: the number of each near cell among them. */
  private readonly near: Map<number, number>[]
  private x = 0
  private y = 0
  private z = 0
  /** Where along a step the point lies. */
  private along = 0

  constructor(private readonly observers: Observers) {
    this.near = observers.places.map(({ near }) => new Map(Array.from(near, (cell, i) => [cell, i])))
  }

  /** Takes a point of a step of the walk within its cell. */
  take({ x0, y0, z0, ux, uy, uz, s }: Walk, step: number): void {
    this.along = (this.along + GOLDEN) % 1
    const at = s + this.along * step
    this.x = x0 + at * ux
    this.y = y0 + at * uy
    this.z = z0 + at * uz
  }

  /** Looks to the observer at a place; where the cell of the point is near to him, returns its number among those. */
  look(place: number, cell: number): number | undefined {
    const { at, within } = this.observers.places[place]
    const dx = at[0] - this.x
    const dy = at[1] - this.y
    const dz = at[2] - this.z
    const distance = Math.sqrt(dx * dx + dy * dy + dz * dz)
    this.tx = dx / distance
    this.ty = dy / distance
    this.tz = dz / distance
    return distance < within ? this.near[place].get(cell) : undefined
  }
}
