import { GOLDEN } from '../math/golden.js'
import { bracket } from '../math/interp.js'
import type { StarSpec } from '../scene/types.js'
import type { StarSpectrum } from '../sources/star.js'
import type { PixelFrame } from './frame.js'
import type { StarPlace } from './star-place.js'

/** A star at one frequency. */
export interface StarImage {
  /** Radius of a star that is a sphere, cm; 0 for a point. */
  radius: number
  /** Spectral luminosity, erg/s/Hz. */
  luminosity: number
  /** Specific intensity at the centre of the disk, erg/s/cm2/Hz/sr; 0 for a point. */
  central: number
  limbDarkening: number
}

export function starImage(spec: StarSpec, spectrum: StarSpectrum, nu: number): StarImage {
  const sphere = spec.extent === 'sphere'
  return {
    radius: sphere ? spec.radius! : 0,
    luminosity: spectrum.luminosityNu(nu),
    central: sphere ? spectrum.intensityNu(nu, 1) : 0,
    limbDarkening: spec.limbDarkening
  }
}

/** Optical depth from the observer down to the star (or past its centre) along the ray at an offset (u, v) cm from its centre. */
export type DepthAt = (u: number, v: number) => number

/** Points across a stellar disk, in each direction, at which the optical depth in front is found. */
const DEPTH_GRID = 24
/** So many do where twice as many give the same light to this share. */
const FEWEST = 6
const SAME = 1e-4
/** The same where another star covers a part of it. */
const LIMB_GRID = 128
/** Samples across a pixel or across a disk smaller than two pixels. */
const SAMPLES = 16
const MOST_SAMPLES = 256

/** Spectral luminosity per sr towards the observer (erg/s/Hz/sr) of a star seen through the dust. */
export function allDirectLight(star: StarImage, depthAt: DepthAt): number {
  return directLight(star, [0, 0], depthAt, Number.POSITIVE_INFINITY)
}

/** The same of a star at (x, y) cm in the picture of an observer far away, within `radius` cm of the centre of the picture. */
export function directLight(star: StarImage, [x, y]: [number, number], depthAt: DepthAt, radius: number): number {
  const off = Math.hypot(x, y)
  if (star.radius === 0) return off > radius ? 0 : (star.luminosity / (4 * Math.PI)) * Math.exp(-depthAt(0, 0))
  const seen = off === 0 ? Math.min(radius, star.radius) : star.radius
  const inside = (u: number, v: number) => Math.hypot(x + u, y + v) <= radius
  const seenAt = (points: number) => disk(star, depthAt, inside, seen, points)
  const few = seenAt(FEWEST)
  const more = seenAt(2 * FEWEST)
  if (!more.cut && Math.abs(few.light - more.light) <= SAME * more.light) return more.light
  const all = seenAt(DEPTH_GRID)
  // The limb of another star is sharper than any dust.
  return all.cut ? seenAt(LIMB_GRID).light : all.light
}

/**
 * Light of a disk out to `seen` from its own centre, in rings of equal width: in each the exact light of the annulus, dimmed at points
 * around it. `cut`: another star hides some of the points, and not all.
 */
function disk(
  star: StarImage,
  depthAt: DepthAt,
  inside: (u: number, v: number) => boolean,
  seen: number,
  points: number
): { light: number; cut: boolean } {
  const step = seen / points
  let light = 0
  let hidden = 0
  for (let i = 0; i < points; i++) {
    const ring = annulus(star, i * step, (i + 1) * step)
    let dimming = 0
    for (let k = 0; k < points; k++) {
      const angle = (2 * Math.PI * (k + 0.5)) / points
      const u = (i + 0.5) * step * Math.cos(angle)
      const v = (i + 0.5) * step * Math.sin(angle)
      if (!inside(u, v)) continue
      const depth = depthAt(u, v)
      if (depth === Number.POSITIVE_INFINITY) hidden++
      dimming += Math.exp(-depth)
    }
    light += (ring * dimming) / points
  }
  return { light, cut: hidden > 0 && hidden < points * points }
}

/** Integral of a bare star's intensity between two radii on its disk, erg/s/Hz/sr: with m = mu^2 = 1 - (rho / R)^2. */
function annulus(star: StarImage, from: number, to: number): number {
  const { radius, central, limbDarkening: u } = star
  const area = Math.PI * radius * radius * central
  const cumulative = (rho: number) => {
    const m = Math.max(0, 1 - (rho / radius) ** 2)
    return area * ((1 - u) * (1 - m) + (2 / 3) * u * (1 - m ** 1.5))
  }
  return cumulative(to) - cumulative(from)
}

/** Adds the direct light of a star to `out`, as intensity (erg/s/cm2/Hz/sr) of each pixel; row-major, row 0 the lowest. */
export function addDirectLight(star: StarImage, place: StarPlace, depthAt: DepthAt, frame: PixelFrame, out: Float64Array): void {
  const { columns, rows } = frame
  const [x, y] = place.centre ?? [0, 0]
  const [column, row] = [bracket(columns, x), bracket(rows, y)]
  const pixel = place.size(columns[column], columns[column + 1], rows[row], rows[row + 1])
  if (star.radius >= pixel / 4) addDisk(star, place, depthAt, frame, out)
  else if (place.centre) {
    // Unresolved: all of it in the pixel where it is, or shared by those that meet there.
    const pixels = pixelsAt(place.centre, frame)
    const light = allDirectLight(star, depthAt) / pixels.length
    for (const [i, j] of pixels)
      if (i >= 0 && i < columns.length - 1 && j >= 0 && j < rows.length - 1)
        out[j * (columns.length - 1) + i] += light / place.area(columns[i], columns[i + 1], rows[j], rows[j + 1])
  }
}

/** The disk of a star at points all over the pixels that it covers. */
function addDisk(star: StarImage, place: StarPlace, depthAt: DepthAt, { columns, rows }: PixelFrame, out: Float64Array): void {
  const { radius, central, limbDarkening: u } = star
  const width = columns.length - 1
  const dimming = new Float64Array(DEPTH_GRID * DEPTH_GRID)
  const at = (i: number) => radius * (-1 + (2 * (i + 0.5)) / DEPTH_GRID)
  for (let j = 0; j < DEPTH_GRID; j++) {
    for (let i = 0; i < DEPTH_GRID; i++) {
      const outside = Math.hypot(at(i), at(j)) / radius
      const pull = outside > 0.98 ? 0.98 / outside : 1
      dimming[j * DEPTH_GRID + i] = Math.exp(-depthAt(at(i) * pull, at(j) * pull))
    }
  }
  const nearest = (v: number) => Math.min(DEPTH_GRID - 1, Math.max(0, Math.floor(((v / radius + 1) / 2) * DEPTH_GRID)))
  const offset = new Float64Array(2)
  for (let row = 0; row < rows.length - 1; row++) {
    for (let column = 0; column < width; column++) {
      const [left, right] = [columns[column], columns[column + 1]]
      const [low, high] = [rows[row], rows[row + 1]]
      if (!(place.nearest(left, right, low, high) < radius)) continue
      const size = place.size(left, right, low, high)
      const samples = Math.min(MOST_SAMPLES, Math.max(SAMPLES, Math.ceil((SAMPLES * 4 * size) / radius)))
      let sum = 0
      for (let i = 0; i < samples; i++) {
        const x = left + ((i + 0.5) / samples) * (right - left)
        for (let j = 0; j < samples; j++) {
          // Shifted from column to column: a limb along a row is found no worse than any other.
          const y = low + ((j + ((i * GOLDEN) % 1)) / samples) * (high - low)
          if (!place.offset(x, y, offset)) continue
          const [a, b] = offset
          const m = 1 - (a * a + b * b) / (radius * radius)
          if (m > 0) sum += (1 - u + u * Math.sqrt(m)) * dimming[nearest(b) * DEPTH_GRID + nearest(a)]
        }
      }
      out[row * width + column] += (central * sum) / (samples * samples)
    }
  }
}

/** The pixels (column, row) that meet at a place: one, or more at their border; some may lie outside the picture. */
function pixelsAt([x, y]: [number, number], { columns, rows, round }: PixelFrame): [number, number][] {
  const width = columns.length - 1
  const across = binsAt(columns, x)
  const up = binsAt(rows, y)
  if (!round) return up.flatMap((row) => across.map((column): [number, number] => [column, row]))
  const inside = up.filter((row) => row >= 0 && row < rows.length - 1)
  // All pixels of the outermost row meet at a pole.
  const around = inside.length < up.length ? Array.from({ length: width }, (_, i) => i) : across.map((i) => (i + width) % width)
  return inside.flatMap((row) => around.map((column): [number, number] => [column, row]))
}

/** The bins between edges that meet at a value: one, or two at their border; -1 and the number of bins stand for what is outside. */
function binsAt(edges: Float64Array, value: number): number[] {
  const last = edges.length - 1
  const i = bracket(edges, value)
  const near = 1e-9 * (edges[i + 1] - edges[i])
  if (Math.abs(value - edges[i]) < near) return [i - 1, i]
  if (Math.abs(value - edges[i + 1]) < near) return [i, i + 1]
  return value < edges[0] ? [-1] : value > edges[last] ? [last] : [i]
}
