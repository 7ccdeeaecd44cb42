/** Step at large angles, and where it begins, rad; below, steps are a fifth of the angle. */
const STEP = Math.PI / 180
const GROWTH = 1.2
/** Cosines of smaller angles, rad, are not told from 1. */
const SMALLEST = 1e-6

/**
 * Scattering angles (rad, increasing from 0 to pi) that resolve the forward peak of spheres up to a size parameter: its width is about
 * 1 / x (Bohren & Huffman 1983, section 4.4.3). One degree apart from 5 degrees on.
 */
export function scatteringAngles(largestX: number): Float64Array {
  const angles = [0]
  for (let angle = Math.min(STEP, Math.max(SMALLEST, 0.2 / largestX)); (GROWTH - 1) * angle < STEP; angle *= GROWTH)
    angles.push(angle)
  const from = Math.ceil(angles[angles.length - 1] / STEP + 0.5)
  for (let degree = from; degree <= 180; degree++) angles.push(degree * STEP)
  angles[angles.length - 1] = Math.PI
  return Float64Array.from(angles)
}
