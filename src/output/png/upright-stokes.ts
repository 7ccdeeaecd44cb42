import { pixelFrame } from '../../camera/frame.js'
import { directionAt, placeView } from '../../camera/place-view.js'
import { dot } from '../../camera/sight.js'
import { doubled } from '../../camera/stokes-ray.js'
import type { CameraImages } from '../../camera/types.js'
import { isFromPlace } from '../../scene/is-from-place.js'
import type { Vector } from '../../scene/types.js'
import { FRAME, frameTowards } from '../../transport/observer-frame.js'

/**
 * Q and U of wavelength number `k` of a camera that has Stokes parameters, referred to what is up in the picture: in a perspective one meridians
 * are aslant, in all others they are up.
 */
export function uprightStokes({ camera, stokes, width, height }: CameraImages, k: number): { q: Float64Array; u: Float64Array } {
  const pixels = width * height
  const [q, u] = [stokes!.q, stokes!.u].map((plane) => plane.slice(k * pixels, (k + 1) * pixels))
  if (!isFromPlace(camera.view) || camera.view.allSky) return { q, u }
  const view = placeView(camera.view)
  const { columns, rows } = pixelFrame(camera, 1)
  const frame = new Float64Array(FRAME)
  const ahead = new Float64Array(3)
  for (let i = 0; i < pixels; i++) {
    const [column, row] = [i % width, Math.floor(i / width)]
    directionAt(view, 0.5 * (columns[column] + columns[column + 1]), 0.5 * (rows[row] + rows[row + 1]), ahead)
    frameTowards(-ahead[0], -ahead[1], -ahead[2], frame, 0)
    const [north, east] = [frame.slice(3, 6), frame.slice(6, 9)] as unknown as [Vector, Vector]
    // Up from the meridian; north from up is the same angle the other way.
    const [cos, sin] = doubled(dot(north, view.up), dot(east, view.up))
    ;[q[i], u[i]] = [q[i] * cos + u[i] * sin, u[i] * cos - q[i] * sin]
  }
  return { q, u }
}
