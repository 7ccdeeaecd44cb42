import type { Vector } from '../scene/types.js'
import { directionAt, type PlaceView, placeOf, solidAngleOf } from './place-view.js'
import { acrossTo, dot, type View } from './sight.js'

/** How a star and what is about it lie in a picture; a rectangle of the picture is given by its left, right, low and high edge. */
export interface StarPlace {
  /** Where its centre is seen; undefined for a star behind the observer. */
  centre?: [x: number, y: number]
  /** Offset of (x, y) from the centre across the line of sight, cm, into `out`; false for what is behind the observer. */
  offset(x: number, y: number, out: Float64Array): boolean
  /** Least distance of a rectangle from the centre, or less, cm. */
  nearest(left: number, right: number, low: number, high: number): number
  /** Longer side of a rectangle near the star, cm. */
  size(left: number, right: number, low: number, high: number): number
  /** Solid angle of a rectangle times the square of the distance, cm2. */
  area(left: number, right: number, low: number, high: number): number
}

export function starPlace(at: Vector, view: View): StarPlace {
  return 'from' in view ? nearPlace(at, view) : farPlace(dot(at, view.right), dot(at, view.up))
}

function farPlace(x0: number, y0: number): StarPlace {
  return {
    centre: [x0, y0],
    offset: (x, y, out) => {
      out[0] = x - x0
      out[1] = y - y0
      return true
    },
    nearest: (left, right, low, high) => Math.hypot(Math.max(0, left - x0, x0 - right), Math.max(0, low - y0, y0 - high)),
    size: (left, right, low, high) => Math.max(right - left, high - low),
    area: (left, right, low, high) => (right - left) * (high - low)
  }
}

function nearPlace(at: Vector, view: PlaceView): StarPlace {
  const { distance, ahead, axes } = acrossTo(view, at)
  const centre = placeOf(view, ahead)
  const direction = new Float64Array(3)
  const offset = (x: number, y: number, out: Float64Array) => {
    directionAt(view, x, y, direction)
    const seen = direction as unknown as Vector
    out[0] = distance * dot(seen, axes[0])
    out[1] = distance * dot(seen, axes[1])
    return dot(seen, ahead) > 0
  }
  const [one, other] = [new Float64Array(2), new Float64Array(2)]
  const between = (ax: number, ay: number, bx: number, by: number) =>
    offset(ax, ay, one) && offset(bx, by, other) ? Math.hypot(one[0] - other[0], one[1] - other[1]) : Number.POSITIVE_INFINITY
  return {
    ...(centre && { centre }),
    offset,
    nearest: (left, right, low, high) => {
      const [x, y] = [0.5 * (left + right), 0.5 * (low + high)]
      const corners = [left, right].flatMap((cornerX) => [low, high].map((cornerY): [number, number] => [cornerX, cornerY]))
      if (!offset(x, y, one))
        return corners.some(([cornerX, cornerY]) => offset(cornerX, cornerY, one)) ? 0 : Number.POSITIVE_INFINITY
      const away = Math.hypot(one[0], one[1])
      return away - Math.max(...corners.map(([cornerX, cornerY]) => between(x, y, cornerX, cornerY)))
    },
    size: (left, right, low, high) => {
      const [x, y] = [0.5 * (left + right), 0.5 * (low + high)]
      return Math.max(between(left, y, right, y), between(x, low, x, high))
    },
    area: (left, right, low, high) => distance * distance * solidAngleOf(view, left, right, low, high)
  }
}
