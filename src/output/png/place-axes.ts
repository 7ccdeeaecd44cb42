import { DEGREE } from '../../units/angles.js'
import { roomyTicks } from '../draw/axis.js'
import { linearTicks, type Ticks } from '../draw/ticks.js'
import type { PictureSide, PictureSides } from './sky-axes.js'

/** Steps between the marks of a map of all directions, deg. */
const STEPS = [10, 15, 30, 45, 60, 90]
/** Pixels that a labelled mark wants. */
const ROOM = 60

/**
 * The sides of a picture from a place, of `width` x `height` pixels, in degrees. A map of all directions: longitude, `middle` (deg) in its
 * middle and growing to the left, and latitude. A perspective one of full angles `field` (rad): angles from the line of sight, along the two
 * lines through the middle.
 */
export function placeSides(field: [number, number], middle: number | undefined, width: number, height: number): PictureSides {
  const [bottom, left] =
    middle === undefined
      ? [perspective(field[0], width, true), perspective(field[1], height, false)]
      : [longitude(middle, width), latitude(height)]
  const bare = ({ ticks: { major, minor }, share }: PictureSide): PictureSide => ({
    ticks: { major: [], minor: [...minor, ...major.map(({ value }) => value)], exponent: 0 },
    title: '',
    share
  })
  return { bottom, left, top: bare(bottom), right: bare(left) }
}

function perspective(angle: number, pixels: number, horizontal: boolean): PictureSide {
  const half = angle / DEGREE / 2
  const ticks = roomyTicks(pixels, 2 * half, horizontal, (count) => linearTicks(-half, half, count))
  const flat = Math.tan(angle / 2)
  return {
    ticks,
    title: `offset ${horizontal ? 'to the left' : 'up'} (deg)`,
    share: (value) => 0.5 - (0.5 * Math.tan(value * DEGREE)) / flat
  }
}

function longitude(middle: number, pixels: number): PictureSide {
  const label = (value: number) => String(((value % 360) + 360) % 360)
  return {
    ticks: roundTicks(middle - 180, middle + 180, pixels, label),
    title: 'longitude (deg)',
    share: (value) => 0.5 - (value - middle) / 360
  }
}

function latitude(pixels: number): PictureSide {
  const label = (value: number) => String(value).replace('-', '−')
  return { ticks: roundTicks(-90, 90, pixels, label), title: 'latitude (deg)', share: (value) => 0.5 - value / 180 }
}

function roundTicks(low: number, high: number, pixels: number, label: (value: number) => string): Ticks {
  const step = STEPS.find((degrees) => (pixels * degrees) / (high - low) >= ROOM) ?? 90
  const multiples = (size: number) => {
    const first = Math.ceil(low / size - 1e-9)
    return Array.from({ length: Math.floor(high / size + 1e-9) - first + 1 }, (_, i) => (first + i) * size)
  }
  return { major: multiples(step).map((value) => ({ value, label: label(value) })), minor: multiples(step / 3), exponent: 0 }
}
