import type { CameraImages } from '../../camera/types.js'
import type { Scene } from '../../scene/types.js'
import { intensityUnit } from '../../units/intensity.js'
import { redBlue } from '../draw/colours.js'
import { unitText } from '../draw/numbers.js'
import { logTicks, scaledUnit, type Ticks } from '../draw/ticks.js'
import { pixelContext } from '../pixel-context.js'
import { stokesUnit } from '../stokes-unit.js'
import { panelSize } from './panel-size.js'
import { cameraView, flatField, skyPicture } from './sky-picture.js'
import { chooseStretch } from './stretch.js'
import { uprightStokes } from './upright-stokes.js'

/**
 * Azimuthal Stokes parameters about the middle of the picture (de Boer et al. 2020, A&A 633, A63; from memory):
 * Q_phi = -Q cos 2 phi - U sin 2 phi, U_phi = Q sin 2 phi - U cos 2 phi, phi the position angle of the pixel. Q_phi > 0 is an
 * electric vector across the direction to the centre, as single scattering gives it.
 */
export function azimuthalStokes(images: CameraImages, k: number): { q: Float64Array; u: Float64Array } {
  const { width, height, camera } = images
  const stokes = uprightStokes(images, k)
  const field = flatField(camera)
  const pixels = width * height
  const found = { q: new Float64Array(pixels), u: new Float64Array(pixels) }
  for (let i = 0; i < pixels; i++) {
    const north = ((Math.floor(i / width) + 0.5) / height - 0.5) * field[1]
    const east = -(((i % width) + 0.5) / width - 0.5) * field[0]
    const angle = 2 * Math.atan2(east, north)
    const [q, u] = [stokes.q[i], stokes.u[i]]
    found.q[i] = -q * Math.cos(angle) - u * Math.sin(angle)
    found.u[i] = q * Math.sin(angle) - u * Math.cos(angle)
  }
  return found
}

/** Smallest share of the strongest value where the stretch begins to be logarithmic. */
const softest = 1e-3

/** The picture (PNG) of Q_phi or U_phi of wavelength number `k` of a camera that has Stokes parameters; both with the same scale. */
export function azimuthalPicture(images: CameraImages, k: number, scene: Scene, part: 'q' | 'u'): Uint8Array {
  const planes = azimuthalStokes(images, k)
  const view = cameraView(images, k, scene)
  const size = panelSize(view)
  const unit = intensityUnit(stokesUnit(images.camera.unit))
  const { low, high, brightest, cut, empty } = chooseStretch(Float64Array.from([...planes.q, ...planes.u], Math.abs))
  const most = unit.fromCgs(high, pixelContext(images, k))
  // Linear about 0, logarithmic far from it: faint light shows its sign too.
  const soft = Math.max(softest, low / high)
  const ticks = signedTicks(2 * soft * most, most)
  const place = (share: number) => 0.5 + (0.5 * Math.asinh(Math.max(-1, Math.min(1, share)) / soft)) / Math.asinh(1 / soft)
  const limit = unit.fromCgs(brightest, pixelContext(images, k))
  const strongest = cut ? `; a few pixels are stronger, up to ${Number(limit.toPrecision(3))} ${unitText(unit.name)}` : ''
  return skyPicture(view, {
    values: planes[part],
    size,
    map: redBlue,
    light: true,
    colour: (value) => place(value / high),
    ticks,
    title: `${part === 'q' ? 'Q' : 'U'}φ about the centre (${scaledUnit(unitText(unit.name), ticks.exponent)})`,
    fraction: (value) => place(value / most),
    note: empty
      ? 'no polarised light'
      : `arsinh stretch; red: ${part === 'q' ? 'across the direction to the centre' : 'positive'}${strongest}`
  })
}

/** Marks at 0 and at decades, or parts of them, between `least` and `most` of either sign. */
function signedTicks(least: number, most: number): Ticks {
  const { major, minor } = logTicks(least, most, 4)
  const negative = major.map(({ value, label }) => ({ value: -value, label: `−${label}` }))
  return {
    major: [...negative, { value: 0, label: '0' }, ...major],
    minor: [...minor.map((value) => -value), ...minor],
    exponent: 0
  }
}
