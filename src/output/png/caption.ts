import type { CameraImages } from '../../camera/types.js'
import type { Scene } from '../../scene/types.js'
import { PARSEC } from '../../units/constants.js'
import { shortNumber, unitText } from '../draw/numbers.js'
import { fitted, text } from '../draw/svg.js'
import { inDegrees } from '../in-degrees.js'
import { wavelengthLabels } from '../wavelength-label.js'
import type { IntensityScale } from './intensity-scale.js'

const titleStyle = { size: 17, anchor: 'start', bold: true } as const

/** Title of the scene, then camera, wavelength, view and distance, at the top of a picture `width` pixels wide. */
export function headLines({ camera }: CameraImages, k: number, scene: Scene, left: number, width: number): string[] {
  const wavelength = unitText(wavelengthLabels(camera.wavelengths)[k].replace(/(?<=\d)(?=[a-z])/, ' '))
  const { inclination, azimuth, roll } = camera.view
  const [i, a, r] = [inclination, azimuth, roll].map((angle) => `${shortNumber(inDegrees(angle))}°`)
  const view = `inclination ${i}, azimuth ${a}, roll ${r} east of north`
  const second = `camera ${camera.name} · ${wavelength} · ${view} · ${shortNumber(scene.distance / PARSEC)} pc`
  const room = width - 2 * left
  return [
    text(left, 28, fitted(scene.title, room, titleStyle), titleStyle),
    text(left, 50, fitted(second, room), { anchor: 'start' })
  ]
}

/** What the stretch is, and what it leaves out, in words. */
export function stretchNote({ stretch, brightest }: IntensityScale): string {
  if (stretch.empty) return 'no light in this image'
  return `${stretch.kind} stretch${stretch.cut ? `; a few pixels are brighter, up to ${brightest}` : ''}`
}
