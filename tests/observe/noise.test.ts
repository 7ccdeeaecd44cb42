import { describe, expect, it } from 'vitest'
import { takePicture } from '../../src/observe/picture.js'
import type { PictureSpec } from '../../src/observe/types.js'
import { ARCSECOND } from '../../src/units/angles.js'
import { cameraSource, firstWavelength, MJY, pictureSpec, total } from './sources.js'

const FWHM = 2 * Math.sqrt(2 * Math.LN2)
const source = cameraSource(() => MJY, { width: 128, height: 128 })
const see = (change: Partial<PictureSpec>, seed = 'night') =>
  takePicture(pictureSpec(change), source, firstWavelength(source), seed)
const COUNT = 128 * 128

/** Mean product of noise this many pixels apart, of interior pixels. */
function correlation(noise: Float64Array, dx: number, dy: number): number {
  let sum = 0
  let pairs = 0
  for (let y = 0; y + dy < 128; y++) {
    for (let x = 0; x + dx < 128; x++, pairs++) sum += noise[y * 128 + x] * noise[(y + dy) * 128 + x + dx]
  }
  return sum / pairs
}

describe('noise', () => {
  it('of a level per pixel is independent, of that level, and repeats with its seed', () => {
    const spec: Partial<PictureSpec> = { noise: { kind: 'rms', level: { number: 0.2, unit: 'MJy/sr' }, per: 'pixel' } }
    const { observed, expected, noise } = see(spec)
    const drawn = observed.map((value, i) => (value - expected[i]) / MJY)
    // Five sigma of 16384 numbers.
    expect(Math.abs(correlation(drawn, 0, 0) / 0.04 - 1)).toBeLessThan(5 * Math.sqrt(2 / COUNT))
    expect(Math.abs(correlation(drawn, 1, 0) / 0.04)).toBeLessThan(5 / Math.sqrt(COUNT))
    expect(noise![5] / MJY).toBeCloseTo(0.2, 12)
    expect(see(spec).observed).toEqual(observed)
    expect(see(spec, 'other').observed).not.toEqual(observed)
    expect(see({ ...spec, name: 'q' }).observed).not.toEqual(observed)
  })

  it('per beam is correlated as white noise seen with the beam: a Gaussian sqrt(2) times as wide', () => {
    const major = 0.6 * ARCSECOND
    const { observed, expected, context } = see({
      beam: { kind: 'gaussian', major, minor: major, positionAngle: 0 },
      noise: { kind: 'rms', level: { number: 3, unit: 'mJy/beam' }, per: 'beam' }
    })
    const mjy = (value: number) => (value * context.beamSr!) / 1e-26
    const drawn = observed.map((value, i) => mjy(value - expected[i]))
    const sigma = 6 / FWHM
    // About COUNT / (8 pi sigma^2) independent values; five sigma.
    const allowed = 5 * Math.sqrt((2 * 8 * Math.PI * sigma ** 2) / COUNT)
    for (const [dx, dy] of [
      [0, 0],
      [3, 0],
      [0, 5],
      [4, 4]
    ])
      expect(Math.abs(correlation(drawn, dx, dy) / 9 - Math.exp(-(dx ** 2 + dy ** 2) / (4 * sigma ** 2)))).toBeLessThan(allowed)
  })

  it('of an exposure: Poisson counts of source and sky, read noise, and the sky taken off', () => {
    const spec: Partial<PictureSpec> = {
      background: { level: { number: 4, unit: 'MJy/sr' }, subtracted: true },
      noise: { kind: 'exposure', time: 50, zeroPoint: { number: 0.2, unit: 'uJy' }, readNoise: 12 },
      unit: 'counts'
    }
    const { observed, expected, noise, unit, context } = see(spec)
    // 1 MJy/sr in (0.1 arcsec)^2 is 0.235044 uJy: 58.761 counts in 50 s, the sky four times that.
    const counts = unit.fromCgs(expected[0], context)
    expect(counts).toBeCloseTo((23.5044305390979 * 0.01 * 50) / 0.2, 9)
    const variance = 5 * counts + 144
    expect(unit.fromCgs(noise![7], context)).toBeCloseTo(Math.sqrt(variance), 9)
    const drawn = observed.map((value) => unit.fromCgs(value, context) - counts)
    expect(Math.abs(total(drawn) / COUNT)).toBeLessThan(5 * Math.sqrt(variance / COUNT))
    expect(Math.abs(correlation(drawn, 0, 0) / variance - 1)).toBeLessThan(5 * Math.sqrt(2 / COUNT))
    const withSky = see({ ...spec, background: { ...spec.background!, subtracted: false } })
    expect(unit.fromCgs(withSky.expected[0], context)).toBeCloseTo(5 * counts, 9)
    // The same counts are read either way.
    expect(unit.fromCgs(withSky.observed[3], context) - 4 * counts).toBeCloseTo(unit.fromCgs(observed[3], context), 8)
  })

  it('magnitudes count from the flux given', () => {
    const { unit, context } = see({ unit: 'mag/arcsec2', zeroMagnitude: 640e-23 })
    // 1 MJy/sr is 23.504 uJy/arcsec2.
    expect(unit.fromCgs(MJY, context)).toBeCloseTo(-2.5 * Math.log10(23.5044305390979e-6 / 640), 10)
    expect(unit.toCgs(unit.fromCgs(MJY, context), context) / MJY).toBeCloseTo(1, 12)
  })
})
