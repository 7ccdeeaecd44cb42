import type { CameraImages } from '../camera/types.js'
import { isFromPlace } from '../scene/is-from-place.js'
import { LIGHT_SPEED } from '../units/constants.js'

/**
 * What a unit of intensity may need to know: the frequency of wavelength number `k`, Hz, and the solid angle of a pixel, sr; NaN where
 * pixels differ in it.
 */
export function pixelContext({ camera, width, height }: CameraImages, k: number): { frequencyHz: number; pixelSr: number } {
  return {
    frequencyHz: LIGHT_SPEED / camera.wavelengths[k],
    pixelSr: isFromPlace(camera.view) ? Number.NaN : (camera.field[0] / width) * (camera.field[1] / height)
  }
}
