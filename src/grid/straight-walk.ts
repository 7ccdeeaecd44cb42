/**
 * What walks through cells of either kind have in common: a ray is kept as its closest approach to the origin of coordinates
 * (x0, y0, z0), cm, and the path `s` from there along the unit vector (ux, uy, uz).
 */
export abstract class StraightWalk {
  x0 = 0
  y0 = 0
  z0 = 0
  ux = 0
  uy = 0
  uz = 1
  /** Path from the closest approach, cm. */
  s = 0
  /** Square of the impact parameter about the origin of coordinates, cm2. */
  b2 = 0
  /** Index of the cell the ray is in; -1 when it has left all cells. */
  cell = 0
  /** Where the next wall stands on the path, set by `toWall`. */
  sWall = 0
  /** Between which paths dust is met, set by `trim`. */
  begin = 0
  end = 0

  /** Density at a path between `begin` and `end` over its mean in the present cell. */
  abstract density(s: number): number

  /** Finds `begin` and `end` of what dust is on the next `step`, cm, of the path, within the cell. */
  abstract trim(step: number): void

  /** Length at the mean density of the cell that holds as much as the next `step` of the path, cm: what optical depths are made of. */
  abstract weighed(step: number): number

  /** The step that holds as much as a length at the mean density, cm; no longer than that to the wall found by `toWall`. */
  abstract stepOf(weighed: number): number

  get x(): number {
    return this.x0 + this.s * this.ux
  }

  get y(): number {
    return this.y0 + this.s * this.uy
  }

  get z(): number {
    return this.z0 + this.s * this.uz
  }
}
