/** What a camera or an aperture catches of single packets: a rectangle of pixels or a disk on the sky, far away. */
export interface Detector {
  /** Unit vectors of the scene towards the observer, to the right (west) and up (north) in the picture. */
  observer: [number, number, number]
  right: [number, number, number]
  up: [number, number, number]
  /** Pixels; 1 x 1 for an aperture. */
  width: number
  height: number
  /** Half the field in cm at the source; for an aperture its radius, which may be infinite. */
  halfWidth: number
  halfHeight: number
  round: boolean
}

export function detectorPixels(detectors: Detector[]): number {
  return detectors.reduce((sum, detector) => sum + detector.width * detector.height, 0)
}

/** Pixel of a point of the scene seen by the detector, or -1. */
export function pixelOf(detector: Detector, x: number, y: number, z: number): number {
  const { right, up, halfWidth, halfHeight, width, height } = detector
  const a = x * right[0] + y * right[1] + z * right[2]
  const b = x * up[0] + y * up[1] + z * up[2]
  if (detector.round) return a * a + b * b <= halfWidth * halfWidth ? 0 : -1
  const column = Math.floor(((a + halfWidth) / (2 * halfWidth)) * width)
  const row = Math.floor(((b + halfHeight) / (2 * halfHeight)) * height)
  return column >= 0 && column < width && row >= 0 && row < height ? row * width + column : -1
}
