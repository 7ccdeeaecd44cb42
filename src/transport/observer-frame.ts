/** Numbers of a frame: the direction to the observer, his north and his east (north, turned counter-clockwise as he sees it). */
export const FRAME = 9

/** Frames of observers (unit vectors, three numbers each). */
export function observerFrames(observers: Float64Array): Float64Array {
  const frames = new Float64Array((observers.length / 3) * FRAME)
  for (let o = 0; 3 * o < observers.length; o++)
    frameTowards(observers[3 * o], observers[3 * o + 1], observers[3 * o + 2], frames, o * FRAME)
  return frames
}

/** The frame of an observer towards whom (x, y, z) points, a unit vector: north is the projected z axis; for one on the axis see `viewBasis`. */
export function frameTowards(x: number, y: number, z: number, out: Float64Array, to: number): void {
  const across = Math.sqrt(x * x + y * y)
  if (across > 1e-12) frameAt(z, across, x / across, y / across, out, to)
  else frameAt(z, across, 1, 0, out, to)
}

/** The same by cosine and sine of the polar angle and of the azimuth of that direction: on the axis, its limit at that azimuth. */
export function frameAt(z: number, across: number, cos: number, sin: number, out: Float64Array, to: number): void {
  out[to] = across * cos
  out[to + 1] = across * sin
  out[to + 2] = z
  out[to + 3] = -z * cos
  out[to + 4] = -z * sin
  out[to + 5] = across
  out[to + 6] = sin
  out[to + 7] = -cos
  out[to + 8] = 0
}
