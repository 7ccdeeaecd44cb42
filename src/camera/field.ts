/** Something that has an intensity at every point of the picture: in cm, or as `directionAt` has it. */
export interface IntensityField {
  /** Numbers of a ray: RAY_VALUES, or POLARISED_VALUES where light is polarised. */
  size: number
  /** Writes `size` numbers into `out`; the deviations of the groups, for the error, only when `withGroups`. */
  sample(x: number, y: number, out: Float64Array, withGroups: boolean): void
  /** Radii of the cells' walls, increasing from the innermost dust. */
  radii: Float64Array
  /** Radius of the innermost dust. */
  innermost: number
  /** Beyond it the picture is empty. */
  outermost: number
  /** Axis ratio of the ellipses that circles about the axis of the cells make in the picture, from 0.1 to 1. */
  flattening: number
}
