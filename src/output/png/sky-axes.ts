import { ARCSECOND } from '../../units/angles.js'
import { AU } from '../../units/constants.js'
import { type AxisSide, axis, roomyTicks } from '../draw/axis.js'
import { linearTicks, scaledUnit, type Ticks } from '../draw/ticks.js'

/** One side of a picture: its marks, its title, and where a value lies along it, from 0 to 1 rightwards or downwards. */
export interface PictureSide {
  ticks: Ticks
  title: string
  share: (value: number) => number
}

export type PictureSides = Record<AxisSide['side'], PictureSide>

/** Full width and height (rad) of what is shown, and its distance (cm). */
interface SkyFrame {
  field: [number, number]
  distance: number
}

/**
 * The sides of an image on the sky, of `width` x `height` pixels: offsets from its centre, in arcsec (bottom, left) and au (top, right), that
 * grow towards east (left) and north (up).
 */
export function skySides({ field, distance }: SkyFrame, width: number, height: number): PictureSides {
  const side = (horizontal: boolean, unit: string, size: number): PictureSide => {
    const angle = field[horizontal ? 0 : 1]
    const half = angle / size / 2
    const ticks = roomyTicks(horizontal ? width : height, 2 * half, horizontal, (count) => linearTicks(-half, half, count))
    const title = `offset ${horizontal ? 'east' : 'north'} (${scaledUnit(unit, ticks.exponent)})`
    return { ticks, title, share: (value) => 0.5 - (value * size) / angle }
  }
  return {
    bottom: side(true, 'arcsec', ARCSECOND),
    left: side(false, 'arcsec', ARCSECOND),
    top: side(true, 'au', AU / distance),
    right: side(false, 'au', AU / distance)
  }
}

/** The four sides drawn round a panel. */
export function pictureAxes(
  sides: PictureSides,
  { left, top, width, height }: { left: number; top: number; width: number; height: number }
): string[] {
  const side = (name: AxisSide['side'], at: number): string[] => {
    const { ticks, title, share } = sides[name]
    const horizontal = name === 'bottom' || name === 'top'
    const along = (part: number): number => (horizontal ? left + width * part : top + height * part)
    return axis({ side: name, at, middle: along(0.5), position: (value) => along(share(value)), ticks, title })
  }
  return [...side('bottom', top + height), ...side('left', left), ...side('top', top), ...side('right', left + width)]
}
