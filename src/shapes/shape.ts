/**
 * Where a dust component lies: a density known up to a factor, about the origin, symmetric about the plane z = 0.
 * Positions and radii in cm. The relative density may be in any unit; `amountScale` turns it into g/cm3.
 */
export type Shape = SphericalShape | AxialShape

interface ShapeBase {
  /** Density at a point, relative. */
  relativeDensity: (x: number, y: number, z: number) => number
  /** Integral of the relative density over all space, relative x cm3. */
  totalMass: number
  /** Integral of the relative density along the line that defines the optical depth, relative x cm. */
  column: number
  /** Distance from the origin to the nearest dust; 0 when dust reaches the origin. */
  innerRadius: number
  /** Distance from the origin beyond which the dust is negligible (less than 1e-8 of the mass). */
  outerRadius: number
}

export interface SphericalShape extends ShapeBase {
  symmetry: 'spherical'
  /** Radii at which the density jumps. */
  sphereEdges: number[]
  /** Integral of the relative density between two spheres, relative x cm3, to rounding even for a thin layer. */
  massBetween: (from: number, to: number) => number
}

export interface AxialShape extends ShapeBase {
  symmetry: 'axial'
  /** Distances from the z axis at which the density jumps: no dust inside the first nor outside the second. */
  cylinderEdges: [number, number]
  /** Least and greatest ratio of scale height to radius where the dust matters. */
  aspectRatios: [number, number]
}

/** Radii of the spheres on which cells should have walls. */
export function edgeRadii(shape: Shape): number[] {
  return shape.symmetry === 'spherical' ? shape.sphereEdges : [...shape.cylinderEdges, shape.outerRadius]
}
