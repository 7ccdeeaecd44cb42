import { DEGREE } from '../units/angles.js'

/** An angle (rad) in degrees, free of the rounding of the conversion: 35 deg read from a scene is written as 35. */
export function inDegrees(angle: number): number {
  return Number((angle / DEGREE).toPrecision(15))
}
