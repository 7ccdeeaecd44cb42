/**
 * Where a dust component lies: a density known up to a factor. Positions and radii in cm. The relative density may be in any
 * unit; `amountScale` turns it into g/cm3. Spherical shapes are symmetric about the origin, axial ones about the z axis and the
 * plane z = 0, free ones about nothing.
 */
export type Shape = SphericalShape | AxialShape | FreeShape

interface ShapeBase {
  /** Density at a point, relative. */
  relativeDensity: (x: number, y: number, z: number) => number
  /** Integral of the relative density over all space, relative x cm3. */
  totalMass: number
  /** Integral of the relative density along the line that defines the optical depth, relative x cm; may be infinite. */
  column: number
  /** Ends of that line. */
  line: { from: Point; to: Point }
  /** Distance from the origin to the nearest dust; 0 when dust reaches the origin. */
  innerRadius: number
  /** Distance from the origin beyond which the dust is negligible (less than 1e-8 of the mass). */
  outerRadius: number
  /** Half the side of the smallest cube about the origin that holds the dust, cm; absent: the outer radius. */
  halfSide?: number
  /** The point for three numbers in [0, 1), into `out`: numbers that fill the unit cube evenly give points that lie as the mass does. */
  place: (u: number, v: number, w: number, out: Float64Array) => void
  /** Share of a point of `place` that counts, where dust was taken away from the shape; absent: all. */
  counts?: (x: number, y: number, z: number) => number
  /** Where the density varies over a length much smaller than the shape. */
  details: Details
}

export type Point = readonly [number, number, number]

/** Spheres, within which the density varies over about their radius. */
export interface Details {
  x: ArrayLike<number>
  y: ArrayLike<number>
  z: ArrayLike<number>
  radius: ArrayLike<number>
}

export const noDetails: Details = { x: [], y: [], z: [], radius: [] }

export interface SphericalShape extends ShapeBase {
  symmetry: 'spherical'
  /** Radii at which the density jumps. */
  sphereEdges: number[]
  /** Integral of the relative density between two spheres, relative x cm3, to rounding even for a thin layer. */
  massBetween: (from: number, to: number) => number
}

export interface AxialShape extends ShapeBase {
  symmetry: 'axial'
  /** Radii, distances from the z axis and cosines of the polar angle (above 0) at which the density jumps or has a peak. */
  sphereEdges: number[]
  cylinderEdges: number[]
  coneEdges: number[]
  /** Distances from the z axis between which all dust lies, where it ends in vertical rims. */
  rims?: [inner: number, outer: number]
  /** Least and greatest ratio of scale height to radius where the dust matters; absent when it is not flat. */
  aspectRatios?: [number, number]
  /** Longest step in ln r over which the density is smooth. */
  radialStep: number
  /** Integral of the relative density over cos(theta) at radius r, 0 <= from <= to <= 1, where it is known exactly. */
  polarIntegral?: (r: number, from: number, to: number) => number
}

export interface FreeShape extends ShapeBase {
  symmetry: 'none'
  /** Radii about the origin on which spherical cells should have walls. */
  sphereEdges: number[]
}

/** Radii of the spheres on which cells should have walls. */
export function edgeRadii(shape: Shape): number[] {
  return shape.symmetry === 'axial' ? [...shape.sphereEdges, ...shape.cylinderEdges, shape.outerRadius] : shape.sphereEdges
}
