import { ARCSECOND } from '../../units/angles.js'
import { AU } from '../../units/constants.js'
import { type AxisSide, axis, roomyTicks } from '../draw/axis.js'
import { linearTicks, scaledUnit, type Ticks } from '../draw/ticks.js'

/** Marks of the four sides of an image on the sky: offsets from its centre, in arcsec (bottom, left) and au (top, right). */
export type SkyTicks = Record<AxisSide['side'], Ticks>

const units = { bottom: 'arcsec', left: 'arcsec', top: 'au', right: 'au' }

/** Full width and height (rad) of what is shown, and its distance (cm). */
interface SkyFrame {
  field: [number, number]
  distance: number
}

/** Marks for a panel of `width` x `height` pixels. */
export function skyTicks({ field, distance }: SkyFrame, width: number, height: number): SkyTicks {
  const ticks = (angle: number, unit: number, pixels: number, horizontal: boolean): Ticks => {
    const half = angle / unit / 2
    return roomyTicks(pixels, 2 * half, horizontal, (count) => linearTicks(-half, half, count))
  }
  return {
    bottom: ticks(field[0], ARCSECOND, width, true),
    left: ticks(field[1], ARCSECOND, height, false),
    top: ticks(field[0], AU / distance, width, true),
    right: ticks(field[1], AU / distance, height, false)
  }
}

/** The four sides drawn round a panel; offsets grow towards east (left) and north (up). */
export function skyAxes(
  ticks: SkyTicks,
  { field, distance }: SkyFrame,
  panel: { left: number; top: number; width: number; height: number }
): string[] {
  const { left, top, width, height } = panel
  const scale = { bottom: ARCSECOND, left: ARCSECOND, top: AU / distance, right: AU / distance }
  const side = (name: AxisSide['side'], at: number): string[] => {
    const horizontal = name === 'bottom' || name === 'top'
    const along = (angle: number): number =>
      horizontal ? left + width * (0.5 - angle / field[0]) : top + height * (0.5 - angle / field[1])
    return axis({
      side: name,
      at,
      middle: along(0),
      position: (value) => along(value * scale[name]),
      ticks: ticks[name],
      title: `offset ${horizontal ? 'east' : 'north'} (${scaledUnit(units[name], ticks[name].exponent)})`
    })
  }
  return [...side('bottom', top + height), ...side('left', left), ...side('top', top), ...side('right', left + width)]
}
