import type { FieldOfView } from '../fits/wcs.js'

const longestSide = 720
const longestSideOfStrip = 960
const stripAspect = 2
const squareWithin = 1e-6

/**
 * Pixels of the panel that shows an image, with the aspect of the field: small images are enlarged by a whole factor,
 * larger ones and those whose pixels are not square are fitted to the longest side, which is longer for strips.
 */
export function panelSize({ width, height, field: [across, up] }: FieldOfView): [number, number] {
  const square = Math.abs((across / width) * (height / up) - 1) < squareWithin
  const longest = Math.max(width, height)
  const most = Math.max(across / up, up / across) < stripAspect ? longestSide : longestSideOfStrip
  if (square && longest <= most) {
    const factor = Math.floor(most / longest)
    return [factor * width, factor * height]
  }
  const scale = most / Math.max(across, up)
  return [Math.max(1, Math.round(scale * across)), Math.max(1, Math.round(scale * up))]
}
