import { jinc } from '../math/bessel.js'
import { sumOf } from '../math/stats.js'
import { gaussianBeamSr } from '../units/solid-angle.js'
import type { BeamSpec, Kernel } from './types.js'

/** A beam at one wavelength; angles in rad. */
export interface Beam {
  /** Integral over the beam of its response relative to the peak, sr. */
  solidAngle: number
  /** Smallest full width at half maximum. */
  width: number
  /** Response per sr at an offset from its centre; the integral over the sky is 1. */
  at: (east: number, north: number) => number
  /** Full widths at half maximum and position angle of the major axis; absent for a kernel. */
  ellipse?: { major: number; minor: number; positionAngle: number }
}

/** The beam at a wavelength (cm). */
export function makeBeam(spec: BeamSpec, wavelength: number): Beam {
  switch (spec.kind) {
    case 'gaussian':
      return gaussian(spec.major, spec.minor, spec.positionAngle)
    case 'airy':
      return airy(spec.diameter, spec.obstruction, wavelength)
    case 'kernel':
      return fromImage(spec.kernel)
  }
}

/** The beam turned by an angle, rad, from north towards east. */
export function turned(beam: Beam, angle: number): Beam {
  if (angle === 0) return beam
  const { at, ellipse } = beam
  const [sin, cos] = [Math.sin(angle), Math.cos(angle)]
  return {
    ...beam,
    at: (east, north) => at(east * cos - north * sin, north * cos + east * sin),
    ...(ellipse && { ellipse: { ...ellipse, positionAngle: ellipse.positionAngle + angle } })
  }
}

/** Whether a beam is another at every wavelength. */
export function isChromatic(spec: BeamSpec | undefined): boolean {
  return spec?.kind === 'airy'
}

function gaussian(major: number, minor: number, positionAngle: number): Beam {
  const solidAngle = gaussianBeamSr(major, minor)
  const sin = Math.sin(positionAngle)
  const cos = Math.cos(positionAngle)
  const at = (east: number, north: number) => {
    const along = (north * cos + east * sin) / major
    const across = (east * cos - north * sin) / minor
    return Math.exp(-4 * Math.LN2 * (along * along + across * across)) / solidAngle
  }
  return { solidAngle, width: Math.min(major, minor), at, ellipse: { major, minor, positionAngle } }
}

/**
 * Diffraction by a round mirror with a round obstruction in its middle (Born & Wolf, Principles of Optics, 8.6.2, eq. 31): with
 * v = pi D theta / lambda and obstruction e the amplitude is [2 J1(v)/v - e^2 2 J1(ev)/(ev)] / (1 - e^2). The response per sr at the
 * peak is area / lambda^2.
 */
function airy(diameter: number, obstruction: number, wavelength: number): Beam {
  const solidAngle = wavelength ** 2 / ((Math.PI / 4) * diameter ** 2 * (1 - obstruction ** 2))
  const scale = (Math.PI * diameter) / wavelength
  const e2 = obstruction ** 2
  const relative = (theta: number) => {
    const v = scale * theta
    const amplitude = e2 > 0 ? (jinc(v) - e2 * jinc(obstruction * v)) / (1 - e2) : jinc(v)
    return amplitude * amplitude
  }
  let low = 0
  let high = 1.22 * (wavelength / diameter)
  for (let i = 0; i < 60; i++) {
    const middle = 0.5 * (low + high)
    if (relative(middle) > 0.5) low = middle
    else high = middle
  }
  const width = 2 * low
  const at = (east: number, north: number) => relative(Math.sqrt(east * east + north * north)) / solidAngle
  return { solidAngle, width, at, ellipse: { major: width, minor: width, positionAngle: 0 } }
}

/** A beam given as an image, straight between the centres of its pixels. */
function fromImage({ width, height, values, centre, perEast, perNorth, pixelSr }: Kernel): Beam {
  const sum = sumOf(values)
  const peak = values.reduce((most, value) => Math.max(most, value), 0)
  const scale = 1 / (sum * pixelSr)
  const value = (x: number, y: number) => (x < 0 || y < 0 || x >= width || y >= height ? 0 : values[y * width + x])
  const at = (east: number, north: number) => {
    const x = centre[0] + perEast[0] * east + perNorth[0] * north
    const y = centre[1] + perEast[1] * east + perNorth[1] * north
    const [i, j] = [Math.floor(x), Math.floor(y)]
    const [s, t] = [x - i, y - j]
    const lower = (1 - s) * value(i, j) + s * value(i + 1, j)
    const upper = (1 - s) * value(i, j + 1) + s * value(i + 1, j + 1)
    return scale * ((1 - t) * lower + t * upper)
  }
  const solidAngle = (sum * pixelSr) / peak
  // That of the round Gaussian beam of the same solid angle.
  return { solidAngle, width: Math.sqrt(solidAngle / gaussianBeamSr(1, 1)), at }
}
