import type { CameraImages } from '../../camera/types.js'
import { intensityUnit } from '../../units/intensity.js'
import { shortNumber, unitText } from '../draw/numbers.js'
import { linearTicks, logTicks, scaledUnit, type Ticks } from '../draw/ticks.js'
import { pixelContext } from '../pixel-context.js'
import { chooseStretch, type Stretch, stretched } from './stretch.js'

/** How a picture shows intensity: colours from cgs values, marks of the bar in the unit of the picture. */
export interface IntensityScale {
  stretch: Stretch
  ticks: Ticks
  title: string
  /** The brightest value, with its unit, for people. */
  brightest: string
  /** Place in the colour map, 0 to 1, of a value in the unit of the picture. */
  fraction: (valueInUnit: number) => number
}

/** What is shown, its unit, and the 1 sigma of its noise (cgs): where the stretch is logarithmic, colours begin there. */
export interface ShownIntensity {
  quantity: string
  unit: { name: string; fromCgs: (value: number) => number }
  noise?: number
}

/** Wavelength number `k` of a camera in its unit; `what` it is, where not the specific intensity. */
export function cameraIntensity(images: CameraImages, k: number, what?: string): ShownIntensity {
  const { name, fromCgs } = intensityUnit(images.camera.unit)
  const context = pixelContext(images, k)
  const own = quantityIn(name)
  const quantity = what ? [what, ...(own === 'specific intensity' ? [] : [own])].join(', ') : own
  return { quantity, unit: { name, fromCgs: (value) => fromCgs(value, context) } }
}

/** What values in a unit of intensity are called. */
export function quantityIn(unit: string): string {
  if (unit.startsWith('mag')) return 'AB surface brightness'
  return unit === 'K' ? 'brightness temperature' : 'specific intensity'
}

/** Chooses the stretch for `values` (cgs) and the marks of a colour bar `height` pixels high. */
export function intensityScale({ quantity, unit, noise }: ShownIntensity, values: Float64Array, height: number): IntensityScale {
  const magnitudes = unit.name.startsWith('mag')
  const stretch = chooseStretch(values, magnitudes, noise)
  const name = unitText(unit.name)
  const count = Math.max(2, Math.min(6, Math.round(height / 60)))
  const [low, high] = stretch.empty ? [0, 1] : [unit.fromCgs(stretch.low), unit.fromCgs(stretch.high)]
  const common = { stretch, brightest: `${shortNumber(unit.fromCgs(stretch.brightest))} ${name}` }
  if (magnitudes) {
    const ticks = linearTicks(Math.min(low, high), Math.max(low, high), count)
    return { ...common, ticks, title: `${quantity} (${name})`, fraction: (value) => (value - low) / (high - low) }
  }
  const ticks = stretch.kind === 'logarithmic' ? logTicks(low, high, count + 2) : linearTicks(low, high, count)
  const title = `${quantity} (${scaledUnit(name, ticks.exponent)})`
  return { ...common, ticks, title, fraction: (value) => stretched(value, { ...stretch, low, high }) }
}
