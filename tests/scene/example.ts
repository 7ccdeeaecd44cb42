import { SceneError, type SceneProblem } from '../../src/scene/error.js'
import { parseScene } from '../../src/scene/read.js'

/** A sound scene, one key a line, for tests that change a line of it. */
export const example = `title: Wind of a cool giant
distance: 320 pc
sky: {ra: 84.21 deg, dec: -31.7 deg}
seed: winter-1
sources:
  - name: giant
    temperature: 2800 K
    luminosity: 6000 Lsun
opacities:
  soot:
    law: power
    reference: {wavelength: 1.3 mm, absorption: 2.3 cm2/g}
    slope: 1.5
    scattering: {albedo: 0.5, asymmetry: 0.3}
dust:
  - name: wind
    opacity: soot
    shape: {kind: shell, inner: 6 au, outer: 3000 au, slope: -2}
    amount: {optical-depth: 1.5, at: 0.55 um}
cameras:
  - name: face
    view: {inclination: 35 deg, azimuth: 0 deg, roll: 0 deg}
    field: 12 arcsec
    pixels: 256
    wavelengths: [0.55 um, 2.2 um, 870 um]
    unit: MJy/sr
spectra:
  - name: sed
    view: {inclination: 35 deg}
    aperture: 6 arcsec
    wavelengths: {from: 0.2 um, to: 2 mm, count: 90}
    unit: Jy
`

/** The example with a piece of its text replaced; the piece must be there. */
export function exampleWith(...replacements: [string, string][]): string {
  return replacements.reduce((text, [from, to]) => {
    if (!text.includes(from)) throw new Error(`the example does not hold ${from}`)
    return text.replace(from, to)
  }, example)
}

/** The problems that reading finds; fails when there are none or when anything but a SceneError is thrown. */
export function problemsOf(text: string, file = 'scene.yaml'): SceneProblem[] {
  try {
    parseScene(text, file)
  } catch (error) {
    if (error instanceof SceneError) return error.problems
    throw error
  }
  throw new Error('the scene was accepted')
}
