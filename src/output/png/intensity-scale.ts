import type { CameraImages } from '../../camera/types.js'
import { intensityUnit } from '../../units/intensity.js'
import { shortNumber, unitText } from '../draw/numbers.js'
import { linearTicks, logTicks, scaledUnit, type Ticks } from '../draw/ticks.js'
import { pixelContext } from '../pixel-context.js'
import { chooseStretch, type Stretch, stretched } from './stretch.js'

/** How the picture of one wavelength shows intensity: colours from cgs values, marks of the bar in the camera's unit. */
export interface IntensityScale {
  stretch: Stretch
  ticks: Ticks
  title: string
  /** The brightest value, with its unit, for people. */
  brightest: string
  /** Place in the colour map, 0 to 1, of a value in the camera's unit. */
  fraction: (valueInUnit: number) => number
}

/**
 * Chooses the stretch for `values` (cgs, wavelength number `k`) and the marks of a colour bar `height` pixels high; `what` they are, where
 * not the specific intensity.
 */
export function intensityScale(
  images: CameraImages,
  k: number,
  values: Float64Array,
  height: number,
  what?: string
): IntensityScale {
  const unit = intensityUnit(images.camera.unit)
  const inUnit = (value: number): number => unit.fromCgs(value, pixelContext(images, k))
  const magnitudes = unit.name.startsWith('mag')
  const stretch = chooseStretch(values, magnitudes)
  const name = unitText(unit.name)
  const count = Math.max(2, Math.min(6, Math.round(height / 60)))
  const [low, high] = stretch.empty ? [0, 1] : [inUnit(stretch.low), inUnit(stretch.high)]
  const common = { stretch, brightest: `${shortNumber(inUnit(stretch.brightest))} ${name}` }
  if (magnitudes) {
    const ticks = linearTicks(Math.min(low, high), Math.max(low, high), count)
    return {
      ...common,
      ticks,
      title: `${what ? `${what}, ` : ''}AB surface brightness (${name})`,
      fraction: (value) => (value - low) / (high - low)
    }
  }
  const ticks = stretch.kind === 'logarithmic' ? logTicks(low, high, count + 2) : linearTicks(low, high, count)
  const quantity = [what, unit.name === 'K' ? 'brightness temperature' : what ? '' : 'specific intensity']
    .filter(Boolean)
    .join(', ')
  const title = `${quantity} (${scaledUnit(name, ticks.exponent)})`
  return { ...common, ticks, title, fraction: (value) => stretched(value, { ...stretch, low, high }) }
}
