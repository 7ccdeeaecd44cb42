import { describe, expect, it, test } from 'vitest'
import { makeBeam } from '../../src/observe/beam.js'
import { takePicture } from '../../src/observe/picture.js'
import type { BeamSpec, Kernel } from '../../src/observe/types.js'
import { ARCSECOND, DEGREE } from '../../src/units/angles.js'
import { cameraSource, firstWavelength, MJY, moments, pictureSpec, total } from './sources.js'

const FWHM = 2 * Math.sqrt(2 * Math.LN2)
const gauss = (major: number, minor: number, degrees: number): BeamSpec => ({
  kind: 'gaussian',
  major: major * ARCSECOND,
  minor: minor * ARCSECOND,
  positionAngle: degrees * DEGREE
})
const see = (source: ReturnType<typeof cameraSource>, beam?: BeamSpec, change = {}) =>
  takePicture(pictureSpec({ ...(beam && { beam }), ...change }), source, firstWavelength(source), 'seed')

/** A kernel image of a function of offsets (arcsec), rows from south to north, east to the left. */
function kernelOf(value: (east: number, north: number) => number, side = 41, pixel = 0.05): Kernel {
  const scale = 1 / (pixel * ARCSECOND)
  const middle = (side - 1) / 2
  return {
    file: 'k.fits',
    width: side,
    height: side,
    values: Float64Array.from({ length: side * side }, (_, i) =>
      value((middle - (i % side)) * pixel, (Math.floor(i / side) - middle) * pixel)
    ),
    centre: [middle, middle],
    perEast: [-scale, 0],
    perNorth: [0, scale],
    pixelSr: (pixel * ARCSECOND) ** 2
  }
}

describe('beams', () => {
  // A Gaussian of sigma s1 seen with one of s2 has sigma sqrt(s1^2 + s2^2) along each axis (handbooks; common practice).
  test.each([0, 30, 90, 145])(
    'a Gaussian seen with a Gaussian has the quadrature width, and its flux: position angle %d',
    (degrees) => {
      const source = cameraSource((east, north) => MJY * Math.exp(-(east ** 2 + north ** 2) / 2 / 0.3 ** 2), {
        width: 96,
        height: 96
      })
      const { expected, flux, grid } = see(source, gauss(1, 0.6, degrees))
      const { east, north, across } = moments(expected, grid.width)
      const [a, b] = [1 / FWHM, 0.6 / FWHM].map((sigma) => (sigma / 0.1) ** 2)
      const [sin, cos] = [Math.sin(degrees * DEGREE), Math.cos(degrees * DEGREE)]
      expect(east).toBeCloseTo(9 + a * sin ** 2 + b * cos ** 2, 3)
      expect(north).toBeCloseTo(9 + a * cos ** 2 + b * sin ** 2, 3)
      expect(across).toBeCloseTo((a - b) * sin * cos, 3)
      expect(flux.inPicture / flux.source).toBeCloseTo(1, 6)
    }
  )

  test.each([
    ['gaussian', gauss(0.5, 0.3, 20)],
    ['narrow gaussian', gauss(0.05, 0.05, 0)],
    ['kernel', { kind: 'kernel', kernel: kernelOf((e, n) => Math.exp(-((e - 0.1) ** 2) / 0.02 - n ** 2 / 0.03)) }]
  ] as [string, BeamSpec][])('total flux is kept to 1e-6, in other pixels too: %s', (_, beam) => {
    const source = cameraSource((east, north) => MJY * (Math.hypot(east - 0.3, north + 0.2) < 0.7 ? 1 : 0))
    for (const pixel of [undefined, 0.1, 0.16, 0.35]) {
      const { expected, context } = see(source, beam, pixel ? { pixel: [pixel * ARCSECOND, pixel * ARCSECOND] } : {})
      const flux = total(expected) * context.pixelSr
      expect(flux / (total(source.total) * (0.1 * ARCSECOND) ** 2)).toBeCloseTo(1, 6)
    }
  })

  it('an Airy pattern: first dark ring at 1.22 lambda/D, 83.8 % and 91.0 % of the light within the first two, peak area/lambda^2', () => {
    // Born & Wolf, Principles of Optics, 8.5.2: minima at 3.833/pi and 7.016/pi lambda/D; 1 - J0^2 - J1^2 of the light inside.
    const wavelength = 2e-4
    const beam = makeBeam({ kind: 'airy', diameter: 800, obstruction: 0 }, wavelength)
    const unit = wavelength / 800
    const rings = [3.8317059702 / Math.PI, 7.0155866698 / Math.PI]
    for (const ring of rings) expect(beam.at(ring * unit, 0) * beam.solidAngle).toBeCloseTo(0, 15)
    expect(rings[0]).toBeCloseTo(1.22, 3)
    const within = (radius: number) => {
      const step = radius / 4000
      let sum = 0
      for (let i = 0; i < 4000; i++) sum += 2 * Math.PI * (i + 0.5) * step * step * beam.at(0, (i + 0.5) * step)
      return sum
    }
    expect(within(rings[0] * unit)).toBeCloseTo(0.8378, 4)
    expect(within(rings[1] * unit)).toBeCloseTo(0.9099, 4)
    expect(beam.at(0, 0)).toBeCloseTo((Math.PI * 400 ** 2) / wavelength ** 2, -3)
    // Full width at half maximum 1.029 lambda/D (common practice).
    expect(beam.width / unit).toBeCloseTo(1.029, 3)
  })

  it('an obstructed mirror: the peak falls with its area, the first dark ring shrinks, the light is all there', () => {
    const [wavelength, diameter, obstruction] = [1e-4, 100, 0.33]
    const beam = makeBeam({ kind: 'airy', diameter, obstruction }, wavelength)
    expect(beam.solidAngle).toBeCloseTo(wavelength ** 2 / ((Math.PI / 4) * diameter ** 2 * (1 - obstruction ** 2)), 18)
    // Schroeder, Astronomical Optics, table 10.1 (from memory): first dark ring at 1.10 lambda/D for an obstruction of 0.33.
    const at = (x: number) => beam.at((x * wavelength) / diameter, 0)
    let darkest = 0.9
    for (let x = 0.9; x < 1.3; x += 0.0005) if (at(x) < at(darkest)) darkest = x
    expect(darkest).toBeCloseTo(1.1, 1)
    // Far out the mean intensity falls as r^-3: the integral to r lacks a share that falls as 1/r.
    const shares = [40, 80].map((radius) => {
      let sum = 0
      const step = 0.002
      for (let x = step / 2; x < radius; x += step) sum += 2 * Math.PI * x * step * at(x) * (wavelength / diameter) ** 2
      return 1 - sum
    })
    expect(2 * shares[1] - shares[0]).toBeCloseTo(0, 4)
  })

  it('an Airy pattern in pixels: what is in the picture is what falls within its square', () => {
    // Light of the pattern within a square, by Gauss-Legendre sums of its own; the picture samples it in 0.1 arcsec.
    const wavelength = 1e-3
    const diameter = wavelength / (0.4 * ARCSECOND)
    const source = cameraSource(() => 0, { wavelengths: [wavelength], stars: [{ flux: new Float64Array([1]) }] })
    const { expected, context, beam } = see(source, { kind: 'airy', diameter, obstruction: 0 })
    const half = 3.2 * ARCSECOND
    const n = 1600
    let inside = 0
    for (let j = 0; j < n; j++) {
      for (let i = 0; i < n; i++) inside += beam!.at(((i + 0.5) / n) * half, ((j + 0.5) / n) * half) * (half / n) ** 2
    }
    expect((total(expected) * context.pixelSr) / (4 * inside)).toBeCloseTo(1, 6)
  })

  it('a point star is the beam itself, wherever in a pixel it stands; of 1 Jy it peaks at 1 Jy/beam', () => {
    const beam = gauss(0.8, 0.8, 0)
    for (const east of [0, 0.013, 0.05, 0.31]) {
      const flux = new Float64Array([1e-23])
      const source = cameraSource(() => 0, {
        width: 63,
        height: 63,
        stars: [{ east: east * ARCSECOND, flux }],
        direct: new Float64Array(63 * 63).fill(MJY)
      })
      const { expected, context, flux: kept } = see(source, beam)
      const mean = expected.reduce((sum, value, i) => sum + value * (31 - (i % 63)) * 0.1, 0) / total(expected)
      expect(mean).toBeCloseTo(east, 8)
      expect(kept.inPicture / 1e-23).toBeCloseTo(1, 8)
      // The mean over the pixel under the peak is lower by (pixel/sigma)^2/12.
      const peak = (Math.max(...expected) * context.beamSr!) / 1e-23
      if (east === 0) expect(peak).toBeCloseTo(1 - (0.1 / (0.8 / FWHM)) ** 2 / 12, 4)
    }
  })

  it('a coronagraph dims the star and masks the core, not the dust around', () => {
    const source = cameraSource(() => MJY, { stars: [{ flux: new Float64Array([1e-21]) }] })
    const at = (change: object) => see(source, gauss(0.3, 0.3, 0), change)
    const open = at({})
    const closed = at({ core: { radius: 0.5 * ARCSECOND, starlight: 0.01 } })
    const bare = see(
      cameraSource(() => MJY),
      gauss(0.3, 0.3, 0)
    )
    const outside = 32 * 64 + 38
    expect((closed.expected[outside] - bare.expected[outside]) / (open.expected[outside] - bare.expected[outside])).toBeCloseTo(
      0.01,
      8
    )
    const hidden = Array.from(closed.observed).filter(Number.isNaN).length
    expect(hidden).toBe(closed.masked)
    expect(hidden * 0.01).toBeCloseTo(Math.PI * 0.25, 1)
  })

  it('a kernel is not turned or mirrored: a tail to the east and a shorter one to the north', () => {
    const kernel = kernelOf(
      (east, north) =>
        (Math.abs(north) < 0.06 && east > -0.06 ? 1 : 0) + (Math.abs(east) < 0.06 && north > 0 && north < 0.5 ? 1 : 0)
    )
    const source = cameraSource((east, north) => (Math.hypot(east, north) < 0.08 ? MJY : 0))
    const { expected } = see(source, { kind: 'kernel', kernel })
    const at = (east: number, north: number) => expected[(32 + Math.round(north / 0.1)) * 64 + 31 - Math.round(east / 0.1)]
    expect(at(0.8, 0)).toBeGreaterThan(10 * Math.abs(at(-0.8, 0)))
    expect(at(0, 0.4)).toBeGreaterThan(10 * Math.abs(at(0, -0.4)))
    expect(at(0.8, 0)).toBeGreaterThan(10 * Math.abs(at(0, 0.8)))
  })

  it('a Gaussian as a kernel is the Gaussian', () => {
    const source = cameraSource((east, north) => MJY * (Math.hypot(east - 0.5, north) < 0.9 ? 1 : 0))
    const sigma = 0.8 / FWHM
    const kernel = kernelOf((e, n) => Math.exp(-(e * e + n * n) / 2 / sigma ** 2), 121, 0.03)
    const [as, by] = [see(source, { kind: 'kernel', kernel }), see(source, gauss(0.8, 0.8, 0))]
    // Straight lines between points 0.03 arcsec apart widen it by 0.03^2/6 in variance: 0.1 % of the peak.
    by.expected.forEach((value, i) => {
      expect(Math.abs(as.expected[i] - value)).toBeLessThan(2e-3 * MJY)
    })
    expect(as.beam!.solidAngle / by.beam!.solidAngle).toBeCloseTo(1, 3)
  })

  it('1 sigma of the run is convolved like light, and added up like it over wavelengths', () => {
    const source = cameraSource((east) => MJY * (east > 0 ? 1 : 0), { wavelengths: [1e-3, 2e-3] })
    const half = new Float64Array([0.5, 0.5])
    const spec = pictureSpec({ beam: gauss(0.5, 0.5, 0) })
    const { sigma, expected } = takePicture(spec, source, { weights: half, coarse: half, wavelength: 1.4e-3 }, '')
    for (const at of [32 * 64 + 20, 32 * 64 + 31, 32 * 64 + 32]) expect(sigma[at] / expected[at]).toBeCloseTo(0.01, 8)
  })
})
