import { FRAME, frameAt } from './observer-frame.js'

/** Who sees scattered light: those far away, then those at places of the scene among cells of three dimensions. */
export interface Observers {
  /** Unit vectors towards observers far away, three numbers each. */
  directions: Float64Array
  /** Where others stand. */
  places: Place[]
}

/** A place, cm, and the cells so close to it that light scattered in them is told by direction. */
export interface Place {
  at: [number, number, number]
  near: Int32Array
  /** Nothing of them is farther away, cm. */
  within: number
}

export function observerCount({ directions, places }: Observers): number {
  return directions.length / 3 + places.length
}

/** Polar angles and azimuths of those directions, from 0 to pi and round. */
const POLAR = 13
const AROUND = 24
export const NEAR_DIRECTIONS = POLAR * AROUND

/** Frames of observers in those directions, polar angle by polar angle; north is the projected z axis, at the poles its limit. */
export function nearFrames(): Float64Array {
  const frames = new Float64Array(NEAR_DIRECTIONS * FRAME)
  for (let d = 0; d < NEAR_DIRECTIONS; d++) {
    const polar = (Math.PI * Math.floor(d / AROUND)) / (POLAR - 1)
    const azimuth = (2 * Math.PI * (d % AROUND)) / AROUND
    frameAt(Math.cos(polar), Math.sin(polar), Math.cos(azimuth), Math.sin(azimuth), frames, d * FRAME)
  }
  return frames
}

/** The four directions about a unit vector, and their shares of it, into `indices` and `shares`. */
export function aboutDirection(x: number, y: number, z: number, indices: Int32Array, shares: Float64Array): void {
  const across = Math.sqrt(x * x + y * y)
  const position = (Math.atan2(across, z) / Math.PI) * (POLAR - 1)
  const row = Math.min(POLAR - 2, Math.floor(position))
  const turn = ((Math.atan2(y, x) / (2 * Math.PI) + 1) % 1) * AROUND
  const column = Math.floor(turn) % AROUND
  const [down, right] = [position - row, turn - Math.floor(turn)]
  for (let k = 0; k < 4; k++) {
    const [i, j] = [k >> 1, k & 1]
    indices[k] = (row + i) * AROUND + ((column + j) % AROUND)
    shares[k] = (i === 0 ? 1 - down : down) * (j === 0 ? 1 - right : right)
  }
}

/** Where the tally of the near cells of a place begins, behind that of all cells and observers; of one more than all, its length. */
export function nearOffset(cells: number, observers: Observers, place: number): number {
  const before = observers.places.slice(0, place).reduce((sum, { near }) => sum + near.length, 0)
  return cells * observerCount(observers) + before * NEAR_DIRECTIONS
}
