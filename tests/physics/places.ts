import { pixelSolidAngles } from '../../src/camera/frame.js'
import { placeView } from '../../src/camera/place-view.js'
import type { CameraImages } from '../../src/camera/types.js'
import { isFromPlace } from '../../src/scene/is-from-place.js'
import type { Vector } from '../../src/scene/types.js'
import { type Part, plane, sumOf } from './pictures.js'

export const dot = (a: ArrayLike<number>, b: ArrayLike<number>) => a[0] * b[0] + a[1] * b[1] + a[2] * b[2]

/** Points of a pixel, in each direction. */
const POINTS = 5

/** A function of direction, averaged over every pixel of a camera at a place; its directions are worked out from its angles. */
export function overPixels({ camera, width, height }: CameraImages, value: (direction: Vector) => number): number[] {
  if (!isFromPlace(camera.view)) throw new TypeError('a place is expected')
  const { allSky } = camera.view
  const { forward, right, up } = placeView(camera.view)
  const [across, high] = camera.field.map((angle) => (allSky ? angle / 2 : Math.tan(angle / 2)))
  return Array.from({ length: width * height }, (_, pixel) => {
    let sum = 0
    let weights = 0
    for (let n = 0; n < POINTS * POINTS; n++) {
      const x = ((2 * ((pixel % width) + ((n % POINTS) + 0.5) / POINTS)) / width - 1) * across
      const y = ((2 * (Math.floor(pixel / width) + (Math.floor(n / POINTS) + 0.5) / POINTS)) / height - 1) * high
      const [a, b, c] = allSky ? [Math.cos(y) * Math.cos(x), Math.cos(y) * Math.sin(x), Math.sin(y)] : [1, x, y]
      const norm = Math.hypot(a, b, c)
      const weight = allSky ? Math.cos(y) : 1
      sum += weight * value([0, 1, 2].map((k) => (a * forward[k] + b * right[k] + c * up[k]) / norm) as Vector)
      weights += weight
    }
    return sum / weights
  })
}

/** Intensity summed over solid angle, erg/s/cm2/Hz. */
export function overSky(images: CameraImages, part: Part, k = 0): number {
  const angles = pixelSolidAngles(images.camera)
  return sumOf(plane(images, part, k).map((value, i) => value * angles[i]))
}
