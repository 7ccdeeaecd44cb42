import { LIGHT_SPEED } from '../units/constants.js'

/** Bins in wavelength for the temperature phase, in order of increasing wavelength. */
export interface WavelengthGrid {
  /** Number of bins. */
  count: number
  /** count + 1 increasing wavelengths, cm. */
  edges: Float64Array
  /** Geometric middles, cm. */
  centres: Float64Array
  /** Widths in frequency, Hz, positive. */
  widthsHz: Float64Array
}

/** Width of a bin in ln(wavelength). */
const BIN_WIDTH = 0.015
/** The range always covered, cm: all emission of dust between 1 K (to 0.5 %; 1e-6 at 20 K) and 1e4 K (to 1e-9). */
export const SHORTEST = 0.05e-4
export const LONGEST = 3

/**
 * Logarithmic bins at most 1.5 % wide from `shortest` to `longest` (cm; widened to 0.05 um to 3 cm, so that all dust emission
 * is covered) with an edge on every breakpoint (cm, any order) but those within half a bin of another edge.
 */
export function transportWavelengths(shortest: number, longest: number, breakpoints: number[]): WavelengthGrid {
  const first = Math.min(shortest, SHORTEST)
  const last = Math.max(longest, LONGEST)
  const apart = (a: number, b: number) => Math.log(b / a) > 0.5 * BIN_WIDTH
  const stops = [first]
  for (const stop of [...breakpoints].sort((a, b) => a - b)) {
    if (apart(stops[stops.length - 1], stop) && apart(stop, last)) stops.push(stop)
  }
  stops.push(last)
  const edges = [first]
  for (let i = 1; i < stops.length; i++) {
    const ratio = stops[i] / stops[i - 1]
    const steps = Math.ceil(Math.log(ratio) / BIN_WIDTH)
    for (let k = 1; k < steps; k++) edges.push(stops[i - 1] * ratio ** (k / steps))
    edges.push(stops[i])
  }
  const count = edges.length - 1
  return {
    count,
    edges: Float64Array.from(edges),
    centres: Float64Array.from({ length: count }, (_, k) => Math.sqrt(edges[k] * edges[k + 1])),
    widthsHz: Float64Array.from({ length: count }, (_, k) => LIGHT_SPEED / edges[k] - LIGHT_SPEED / edges[k + 1])
  }
}

/** Wavelengths (cm) between which a blackbody (K) shines: 1e-9 of its power lies below the first and as much beyond the second. */
export function blackbodyRange(temperature: number): [number, number] {
  return [500e-4 / temperature, 535 / temperature]
}
