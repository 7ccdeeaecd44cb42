import { interpolateInferno, interpolateRdBu, interpolateViridis } from 'd3-scale-chromatic'

/** A perceptually uniform colour map as 256 RGB triplets, from the lowest colour to the highest. */
export type ColourMap = Uint8Array

/** For intensity. */
export const inferno = sampled(interpolateInferno)
/** For densities. */
export const viridis = sampled(interpolateViridis)
/** For what has a sign: blue below 0, white at 0, red above. */
export const redBlue = sampled((t) => interpolateRdBu(1 - t))

/** Number of the colour for a fraction of the range; beyond the ends, the colour of the end. */
export function colourIndex(fraction: number): number {
  return fraction > 0 ? Math.min(255, Math.floor(fraction * 256)) : 0
}

function sampled(interpolator: (t: number) => string): ColourMap {
  const map = new Uint8Array(3 * 256)
  for (let i = 0; i < 256; i++) map.set(rgb(interpolator(i / 255)), 3 * i)
  return map
}

function rgb(colour: string): number[] {
  const hex = /^#([0-9a-f]{2})([0-9a-f]{2})([0-9a-f]{2})$/i.exec(colour)
  return hex ? hex.slice(1).map((part) => Number.parseInt(part, 16)) : colour.match(/\d+/g)!.slice(0, 3).map(Number)
}
