import { type Cells, holds, type Walk } from '../grid/cells.js'
import type { Vector } from '../scene/types.js'
import { FRAME, frameTowards } from '../transport/observer-frame.js'
import { directionAt, type PlaceView } from './place-view.js'
import type { ViewBasis } from './view.js'

/** Who looks: an observer far away, along parallel lines, or one at a place of the scene. */
export type View = ViewBasis | PlaceView

/** Lines of sight of an observer, which begin with him. */
export class Sight {
  /** The observer stands among the cells. */
  private readonly within: boolean
  private readonly direction = new Float64Array(3)
  private readonly frame = new Float64Array(FRAME)
  /** Closest approach of the present line to the origin, its direction, and the path from there to the observer. */
  private x = 0
  private y = 0
  private z = 0
  private ux = 0
  private uy = 0
  private uz = 0
  private start = Number.NEGATIVE_INFINITY

  constructor(
    private readonly view: View,
    cells: Cells
  ) {
    this.within = 'from' in view && holds(cells, view.from)
  }

  /** Takes the line that is seen at (x, y) in the picture. */
  look(x: number, y: number): void {
    const { view, direction } = this
    if ('from' in view) {
      directionAt(view, x, y, direction)
      this.leave(view.from)
      return
    }
    const { right, up, observer } = view
    this.x = x * right[0] + y * up[0]
    this.y = x * right[1] + y * up[1]
    this.z = x * right[2] + y * up[2]
    this.ux = -observer[0]
    this.uy = -observer[1]
    this.uz = -observer[2]
  }

  /**
   * Takes the line that passes a point at an offset (u, v) across the line of sight to it (cm, see `acrossTo`); returns the path, as walks
   * count it, at which it is nearest to the point.
   */
  lookPast(at: Vector, u: number, v: number): number {
    const { view, direction } = this
    if (!('from' in view)) {
      this.look(dot(at, view.right) + u, dot(at, view.up) + v)
      return -dot(at, view.observer)
    }
    const { distance, ahead, axes } = acrossTo(view, at)
    const along = Math.sqrt(Math.max(0, distance * distance - u * u - v * v))
    for (let i = 0; i < 3; i++) direction[i] = (along * ahead[i] + u * axes[0][i] + v * axes[1][i]) / distance
    this.leave(view.from)
    return dot(at, [this.ux, this.uy, this.uz])
  }

  /**
   * Where a point (cm) is seen from the present line, as any length towards the north and the east that polarisation refers to there, into
   * `out`: up and left in a picture along parallel lines, else along the meridian, towards +z, and across it.
   */
  directionTo(at: Vector, out: Float64Array): void {
    const { view, frame } = this
    const [dx, dy, dz] = [at[0] - this.x, at[1] - this.y, at[2] - this.z]
    if ('from' in view) {
      frameTowards(-this.ux, -this.uy, -this.uz, frame, 0)
      out[0] = dx * frame[3] + dy * frame[4] + dz * frame[5]
      out[1] = dx * frame[6] + dy * frame[7] + dz * frame[8]
      return
    }
    const { up, right } = view
    out[0] = dx * up[0] + dy * up[1] + dz * up[2]
    out[1] = -(dx * right[0] + dy * right[1] + dz * right[2])
  }

  /** Puts a walk on the line, where it begins: with the observer, or `far` away. */
  takeFrom(walk: Walk, far: number): void {
    const s = Math.max(this.start, -far)
    const { x, y, z, ux, uy, uz } = this
    walk.turn(x + s * ux, y + s * uy, z + s * uz, ux, uy, uz)
  }

  /** Puts a walk where the line enters the cells, or begins among them; false where it meets none. */
  enter(walk: Walk): boolean {
    const { view, within, x, y, z, ux, uy, uz } = this
    if (within && 'from' in view) {
      walk.startAt(view.from[0], view.from[1], view.from[2], ux, uy, uz)
      return true
    }
    return walk.enter(x, y, z, ux, uy, uz) && walk.s >= this.start
  }

  private leave(from: Vector): void {
    const [ux, uy, uz] = this.direction
    const s = from[0] * ux + from[1] * uy + from[2] * uz
    this.start = s
    this.x = from[0] - s * ux
    this.y = from[1] - s * uy
    this.z = from[2] - s * uz
    this.ux = ux
    this.uy = uy
    this.uz = uz
  }
}

/** Distance of a point from the observer, its direction, and two unit vectors across that. */
export function acrossTo(
  { from, right, up }: PlaceView,
  at: Vector
): { distance: number; ahead: Vector; axes: [Vector, Vector] } {
  const away: Vector = [at[0] - from[0], at[1] - from[1], at[2] - from[2]]
  const distance = Math.hypot(...away)
  const ahead = away.map((component) => component / distance) as Vector
  const first = across(Math.abs(dot(up, ahead)) < Math.SQRT1_2 ? up : right, ahead)
  return { distance, ahead, axes: [first, cross(ahead, first)] }
}

/** The part of a unit vector across another, of length 1. */
function across(vector: Vector, ahead: Vector): Vector {
  const along = dot(vector, ahead)
  const part = vector.map((component, i) => component - along * ahead[i])
  const length = Math.hypot(...part)
  return part.map((component) => component / length) as Vector
}

function cross([a, b, c]: Vector, [d, e, f]: Vector): Vector {
  return [b * f - c * e, c * d - a * f, a * e - b * d]
}

export function dot(a: Vector, b: Vector): number {
  return a[0] * b[0] + a[1] * b[1] + a[2] * b[2]
}
