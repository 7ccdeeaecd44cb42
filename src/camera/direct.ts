import type { StarSpec } from '../scene/types.js'
import type { StarSpectrum } from '../sources/star.js'
import type { ViewBasis } from './view.js'

/** A star in the picture, at one frequency. */
export interface StarImage {
  /** Where it is seen, to the right and up, cm. */
  x: number
  y: number
  /** Radius of a star that is a sphere, cm; 0 for a point. */
  radius: number
  /** Spectral luminosity, erg/s/Hz. */
  luminosity: number
  /** Specific intensity at the centre of the disk, erg/s/cm2/Hz/sr; 0 for a point. */
  central: number
  limbDarkening: number
}

export function starImage(spec: StarSpec, spectrum: StarSpectrum, nu: number, { right, up }: ViewBasis): StarImage {
  const sphere = spec.extent === 'sphere'
  const along = (axis: number[]) => axis[0] * spec.at[0] + axis[1] * spec.at[1] + axis[2] * spec.at[2]
  return {
    x: along(right),
    y: along(up),
    radius: sphere ? spec.radius! : 0,
    luminosity: spectrum.luminosityNu(nu),
    central: sphere ? spectrum.intensityNu(nu, 1) : 0,
    limbDarkening: spec.limbDarkening
  }
}

/** Optical depth from the observer down to the star (or past its centre) along the ray at (x, y) cm. */
export type DepthAt = (x: number, y: number) => number

/** Points across a stellar disk, in each direction, at which the optical depth in front is found. */
const DEPTH_GRID = 24
/** The same where another star covers a part of it. */
const LIMB_GRID = 128
/** Samples across a pixel or across a disk smaller than two pixels. */
const SAMPLES = 16

/** Spectral luminosity per sr towards the observer (erg/s/Hz/sr) of a star seen through the dust, within `radius` cm of the centre of the picture. */
export function directLight(star: StarImage, depthAt: DepthAt, radius: number): number {
  const { x, y } = star
  const off = Math.hypot(x, y)
  if (star.radius === 0) return off > radius ? 0 : (star.luminosity / (4 * Math.PI)) * Math.exp(-depthAt(x, y))
  const seen = off === 0 ? Math.min(radius, star.radius) : star.radius
  const all = disk(star, depthAt, radius, seen, DEPTH_GRID)
  // The limb of another star is sharper than any dust.
  return all.cut ? disk(star, depthAt, radius, seen, LIMB_GRID).light : all.light
}

/**
 * Light of a disk out to `seen` from its own centre, in rings of equal width: in each the exact light of the annulus, dimmed at points
 * around it. `cut`: another star hides some of the points, and not all.
 */
function disk(star: StarImage, depthAt: DepthAt, radius: number, seen: number, points: number): { light: number; cut: boolean } {
  const step = seen / points
  let light = 0
  let hidden = 0
  for (let i = 0; i < points; i++) {
    const ring = annulus(star, i * step, (i + 1) * step)
    let dimming = 0
    for (let k = 0; k < points; k++) {
      const angle = (2 * Math.PI * (k + 0.5)) / points
      const px = star.x + (i + 0.5) * step * Math.cos(angle)
      const py = star.y + (i + 0.5) * step * Math.sin(angle)
      if (Math.hypot(px, py) > radius) continue
      const depth = depthAt(px, py)
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

/** A picture of `width` x `height` square pixels of side `pixel` cm about the origin; row 0 is the lowest. */
export interface PixelFrame {
  width: number
  height: number
  pixelWidth: number
  pixelHeight: number
}

/** Adds the direct light of a star to `out`, as intensity (erg/s/cm2/Hz/sr) of each pixel; row-major, row 0 the lowest. */
export function addDirectLight(star: StarImage, depthAt: DepthAt, frame: PixelFrame, out: Float64Array): void {
  const { width, height, pixelWidth, pixelHeight } = frame
  const area = pixelWidth * pixelHeight
  if (star.radius < Math.max(pixelWidth, pixelHeight) / 4) {
    // Unresolved: all of it in the pixel where it is, or shared by those that meet there.
    const columns = pixelsAt(star.x / pixelWidth + width / 2)
    const rows = pixelsAt(star.y / pixelHeight + height / 2)
    const light = directLight(star, depthAt, Number.POSITIVE_INFINITY) / (area * columns.length * rows.length)
    for (const row of rows.filter((k) => k >= 0 && k < height))
      for (const column of columns.filter((k) => k >= 0 && k < width)) out[row * width + column] += light
    return
  }
  const { radius, central, limbDarkening: u } = star
  const dimming = new Float64Array(DEPTH_GRID * DEPTH_GRID)
  const at = (i: number) => radius * (-1 + (2 * (i + 0.5)) / DEPTH_GRID)
  for (let j = 0; j < DEPTH_GRID; j++) {
    for (let i = 0; i < DEPTH_GRID; i++) {
      const outside = Math.hypot(at(i), at(j)) / radius
      const pull = outside > 0.98 ? 0.98 / outside : 1
      dimming[j * DEPTH_GRID + i] = Math.exp(-depthAt(star.x + at(i) * pull, star.y + at(j) * pull))
    }
  }
  const nearest = (v: number) => Math.min(DEPTH_GRID - 1, Math.max(0, Math.floor(((v / radius + 1) / 2) * DEPTH_GRID)))
  const samples = Math.max(SAMPLES, Math.ceil((SAMPLES * 4 * Math.max(pixelWidth, pixelHeight)) / radius))
  const covered = (count: number, size: number, at: number) => [
    Math.max(0, Math.floor(count / 2 + (at - radius) / size) - 1),
    Math.min(count, Math.ceil(count / 2 + (at + radius) / size) + 1)
  ]
  const [firstRow, lastRow] = covered(height, pixelHeight, star.y)
  const [firstColumn, lastColumn] = covered(width, pixelWidth, star.x)
  for (let row = firstRow; row < lastRow; row++) {
    for (let column = firstColumn; column < lastColumn; column++) {
      let sum = 0
      for (let j = 0; j < samples; j++) {
        const y = (row + (j + 0.5) / samples - height / 2) * pixelHeight - star.y
        for (let i = 0; i < samples; i++) {
          const x = (column + (i + 0.5) / samples - width / 2) * pixelWidth - star.x
          const m = 1 - (x * x + y * y) / (radius * radius)
          if (m > 0) sum += (1 - u + u * Math.sqrt(m)) * dimming[nearest(y) * DEPTH_GRID + nearest(x)]
        }
      }
      out[row * width + column] += (central * sum) / (samples * samples)
    }
  }
}

/** The pixels of a row or column that meet at a place, in units of pixels: one, or two at their border. */
function pixelsAt(place: number): number[] {
  const border = Math.round(place)
  return Math.abs(place - border) < 1e-9 ? [border - 1, border] : [Math.floor(place)]
}
