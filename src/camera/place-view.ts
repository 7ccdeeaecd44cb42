import type { PlaceViewSpec, Vector } from '../scene/types.js'

/** An observer at a place of the scene, cm, with unit vectors of his picture in the frame of the scene. */
export interface PlaceView {
  from: Vector
  /** Towards the middle of the picture. */
  forward: Vector
  right: Vector
  up: Vector
  /** A map of all directions about `up`, instead of a perspective picture. */
  allSky: boolean
  /** Where the origin of the scene is seen: coordinates of the picture count from there; (0, 0) where it is not. */
  origin: [x: number, y: number]
  seesOrigin: boolean
}

/** Farthest from the middle of a perspective picture that the origin is looked for. */
const FARTHEST = 10

/**
 * The frame of a view from a place: +z is up, turned by the roll. Looking straight up or down, the picture is that of the limit in the
 * plane y = 0, from where x is larger, as in `viewBasis`. `turn`: the scene is turned by it about z (rad), and the observer with it.
 */
export function placeView(spec: PlaceViewSpec, turn = 0): PlaceView {
  const { from, roll, allSky } = spec
  const { longitude, latitude } = forwardOf(spec, turn)
  const [cosL, sinL, cosB, sinB] = [Math.cos(longitude), Math.sin(longitude), Math.cos(latitude), Math.sin(latitude)]
  const north = [-sinB * cosL, -sinB * sinL, cosB]
  const west = [sinL, -cosL, 0]
  const combine = (a: number, b: number): Vector => [
    a * north[0] + b * west[0],
    a * north[1] + b * west[1],
    a * north[2] + b * west[2]
  ]
  const [cosT, sinT] = [Math.cos(turn), Math.sin(turn)]
  const view: PlaceView = {
    from: [cosT * from[0] - sinT * from[1], sinT * from[0] + cosT * from[1], from[2]],
    forward: [cosB * cosL, cosB * sinL, sinB],
    right: combine(-Math.sin(roll), Math.cos(roll)),
    up: combine(Math.cos(roll), Math.sin(roll)),
    allSky,
    origin: [0, 0],
    seesOrigin: false
  }
  const inwards = view.from.map((component) => -component) as Vector
  const origin = Math.hypot(...inwards) > 0 ? placeOf(view, inwards) : undefined
  return origin && Math.hypot(...origin) < FARTHEST ? { ...view, origin, seesOrigin: true } : view
}

/** Longitude and latitude (rad) of the middle of a picture, in the frame of the scene turned by `turn`. */
export function forwardOf({ from, toward, allSky }: PlaceViewSpec, turn = 0): { longitude: number; latitude: number } {
  const [x, y, z] = toward.map((component, a) => component - from[a])
  const across = Math.hypot(x, y)
  const longitude = (across > 0 ? Math.atan2(y, x) : allSky ? 0 : Math.PI) + turn
  return { longitude, latitude: allSky ? 0 : Math.atan2(z, across) }
}

/**
 * The direction that is seen at (x, y), a unit vector into `out`. A perspective picture is the plane at distance 1 that the line of
 * sight meets at right angles; a map has the angle about `up`, rad, to the right, and the sine of the latitude upwards, so that equal areas are
 * equal solid angles.
 */
export function directionAt({ forward, right, up, allSky, origin }: PlaceView, x: number, y: number, out: Float64Array): void {
  let a = 1
  let b = x + origin[0]
  let c = y + origin[1]
  if (allSky) {
    const cos = Math.sqrt(Math.max(0, 1 - c * c))
    a = cos * Math.cos(b)
    b = cos * Math.sin(b)
  }
  const norm = 1 / Math.sqrt(a * a + b * b + c * c)
  a *= norm
  b *= norm
  c *= norm
  for (let i = 0; i < 3; i++) out[i] = a * forward[i] + b * right[i] + c * up[i]
}

/** Where a direction (of any length) is seen; undefined for what is behind the observer of a perspective picture. */
export function placeOf(
  { forward, right, up, allSky, origin }: PlaceView,
  direction: Vector
): [x: number, y: number] | undefined {
  const [a, b, c] = [forward, right, up].map((axis) => axis[0] * direction[0] + axis[1] * direction[1] + axis[2] * direction[2])
  if (allSky) return [Math.atan2(b, a) - origin[0], c / Math.hypot(a, b, c) - origin[1]]
  return a > 0 ? [b / a - origin[0], c / a - origin[1]] : undefined
}

/** Solid angle of a rectangle of the picture, sr. */
export function solidAngleOf({ allSky, origin }: PlaceView, left: number, right: number, low: number, high: number): number {
  if (allSky) return (right - left) * (high - low)
  const [x0, y0] = origin
  // Of the rectangle between the line of sight and a point of the plane.
  const corner = (a: number, b: number) => {
    const [x, y] = [a + x0, b + y0]
    return Math.atan((x * y) / Math.sqrt(1 + x * x + y * y))
  }
  return corner(right, high) - corner(left, high) - corner(right, low) + corner(left, low)
}
