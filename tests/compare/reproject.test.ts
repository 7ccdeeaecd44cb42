import { describe, expect, it } from 'vitest'
import { reprojected } from '../../src/compare/reproject.js'
import { type ComparedSet, inPlace } from '../../src/compare/sets/compared-set.js'
import { pictureSet } from '../../src/compare/sets/picture-set.js'
import { parseFits } from '../../src/data/fits/read.js'
import { frameAt, skyProjection } from '../../src/data/fits/sky-projection.js'
import { stream } from '../../src/math/random.js'
import { ARCSECOND } from '../../src/units/angles.js'
import { cameraSource, firstWavelength, MJY, total } from '../observe/sources.js'
import { askPython, astropy, itWith } from '../support/python.js'
import { fits, type Layout, lopsided, pictureData, place, wcs } from './measured.js'

const never = (key: string, message: string): never => {
  throw new Error(`${key}: ${message}`)
}

function setOf(layout: Layout, source = lopsided(), values = new Float64Array(layout.width * layout.height)): ComparedSet {
  return pictureSet(pictureData(layout, values), source, source.light, never)
}

/** Solid angle of a pixel, times the sum: flux, cgs. */
const fluxOf = (values: ArrayLike<number>, side: number) => total(Float64Array.from(values)) * (side * ARCSECOND) ** 2

describe('reprojected', () => {
  it('keeps the flux of an image that lies wholly in the new pixels, whatever their size, turn and place', () => {
    const source = lopsided()
    const random = stream('reproject')
    for (let trial = 0; trial < 20; trial++) {
      const side = 0.03 + 0.5 * random()
      const size = Math.ceil(14 / side)
      const angle = 2 * Math.PI * random()
      const [sin, cos] = [Math.sin(angle) / (side * ARCSECOND), Math.cos(angle) / (side * ARCSECOND)]
      const shift = random()
      const to = { width: size, height: size, pixelSr: (side * ARCSECOND) ** 2 }
      const { planes, coverage } = reprojected([source.total], source, to, (east, north) => [
        size / 2 + shift - cos * east + sin * north,
        size / 2 - shift + sin * east + cos * north
      ])
      expect(fluxOf(planes[0], side) / fluxOf(source.total, 0.1)).toBeCloseTo(1, 9)
      expect(Math.max(...coverage)).toBeLessThan(1 + 1e-9)
    }
  })

  it('keeps the flux to 1e-4 through celestial coordinates, of TAN and SIN, turned, mirrored and off the centre', () => {
    for (const layout of [
      { width: 120, height: 110, side: 0.13, turn: 33 },
      { width: 60, height: 64, side: 0.31, turn: -120, mirrored: true, projection: 'SIN', east: 4, north: -3 },
      { width: 500, height: 480, side: 0.04, turn: 200, projection: 'ARC' }
    ]) {
      // The model is dark at its edge, so that pixels outside it hold nothing.
      const source = lopsided()
      const set = setOf(layout, source)
      expect(fluxOf(set.model(inPlace).values, layout.side) / fluxOf(source.total, 0.1)).toBeCloseTo(1, 4)
    }
  })

  it('leaves an even image even', () => {
    const even = cameraSource(() => 7 * MJY, { width: 80, height: 80 })
    const source = { ...even, sky: place, light: firstWavelength(even) }
    const { values } = setOf({ width: 30, height: 30, side: 0.17, turn: 20 }, source).model(inPlace)
    for (const value of Array.from(values)) expect(value / MJY).toBeCloseTo(7, 4)
  })
})

describe('celestial coordinates', () => {
  // Source: astropy.wcs.
  itWith(astropy, 'are those of astropy in every projection that is known', () => {
    const offsets = [
      [0, 0],
      [300, -200],
      [-1200, 2500],
      [5000, 100]
    ]
    for (const projection of ['TAN', 'SIN', 'ARC', 'STG']) {
      const layout = { width: 40, height: 30, side: 60, turn: 27, projection, east: 40, north: 90 }
      const bytes = fits(layout, new Float64Array(1200), wcs(layout))
      const { toPixel } = skyProjection(parseFits(bytes, 'x.fits')[0])
      const { centre, east, north } = frameAt(place.raDeg, place.decDeg)
      const directions = offsets.map(([e, n]) => {
        const sum = centre.map((value, i) => value + e * ARCSECOND * east[i] + n * ARCSECOND * north[i])
        const length = Math.hypot(...sum)
        return sum.map((value) => value / length) as [number, number, number]
      })
      const expected = askPython<number[][]>(
        `
from astropy.io import fits
from astropy.wcs import WCS
import base64, io, numpy as np
header = fits.open(io.BytesIO(base64.b64decode(data['fits'])))[0].header
d = np.array(data['directions'])
ra, dec = np.degrees(np.arctan2(d[:, 1], d[:, 0])), np.degrees(np.arcsin(d[:, 2]))
answer = WCS(header).all_world2pix(np.column_stack([ra, dec]), 0).tolist()`,
        { fits: Buffer.from(bytes).toString('base64'), directions }
      )
      directions.forEach((direction, i) => {
        toPixel(direction).forEach((value, axis) => {
          expect(value).toBeCloseTo(expected[i][axis], 6)
        })
      })
    }
  })

  // Source: astropy.wcs and astropy.coordinates.
  itWith(astropy, 'put a spot in the north-east of a model where astropy has it in turned and mirrored data', () => {
    const spot = cameraSource((east, north) => MJY * Math.exp(-((east - 1.05) ** 2 + (north - 1.85) ** 2) / 0.1), {
      width: 80,
      height: 80
    })
    const source = { ...spot, sky: place, light: firstWavelength(spot) }
    for (const layout of [
      { width: 70, height: 60, side: 0.1 },
      { width: 70, height: 60, side: 0.12, turn: 70 },
      { width: 70, height: 60, side: 0.09, turn: -25, mirrored: true, projection: 'SIN' }
    ]) {
      const set = setOf(layout, source)
      const { values } = set.model(inPlace)
      if (set.shown.kind !== 'picture') throw new Error('no picture')
      const { pixels } = set.shown
      const mean = (of: (pixel: number) => number) =>
        Array.from(pixels).reduce((sum, pixel, i) => sum + values[i] * of(pixel), 0) / total(Float64Array.from(values))
      const bytes = fits(layout, new Float64Array(4200), wcs(layout))
      const [x, y] = askPython<[number, number]>(
        `
from astropy.io import fits
from astropy.wcs import WCS
from astropy.coordinates import SkyCoord
import astropy.units as u, base64, io
header = fits.open(io.BytesIO(base64.b64decode(data['fits'])))[0].header
there = SkyCoord(data['ra'], data['dec'], unit='deg').spherical_offsets_by(1.05 * u.arcsec, 1.85 * u.arcsec)
answer = [float(v) for v in WCS(header).world_to_pixel(there)]`,
        { fits: Buffer.from(bytes).toString('base64'), ra: place.raDeg, dec: place.decDeg }
      )
      expect(mean((pixel) => pixel % layout.width)).toBeCloseTo(x, 2)
      expect(mean((pixel) => Math.floor(pixel / layout.width))).toBeCloseTo(y, 2)
    }
  })
})
