import { execFileSync } from 'node:child_process'
import { writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { pixelSolidAngles } from '../../../src/camera/frame.js'
import { directionAt, placeView } from '../../../src/camera/place-view.js'
import type { CameraImages } from '../../../src/camera/types.js'
import { cameraFits } from '../../../src/output/fits/camera-fits.js'
import { cameraPicture } from '../../../src/output/png/camera-picture.js'
import type { PlaceViewSpec, Vector } from '../../../src/scene/types.js'
import { folderWith } from '../../support/folder-with.js'
import { astropy, fitsverify, itWith, runPython } from '../../support/python.js'
import { exampleImages, exampleScene } from '../examples.js'

const folder = folderWith({})

const degree = Math.PI / 180
const au = 1.495978707e13

/** Images of a camera at a place; field in deg. */
function imagesFrom(view: PlaceViewSpec, fieldDeg: [number, number], pixels: [number, number]): CameraImages {
  const images = exampleImages((x, y) => (1 + x + 10 * y) * 1e-17, { pixels })
  const star = {
    name: 'sun',
    east: 200 * degree,
    north: -5 * degree,
    radius: 0,
    limbDarkening: 0,
    flux: new Float64Array([1e-23, 2e-23])
  }
  const field = fieldDeg.map((angle) => angle * degree) as [number, number]
  return { ...images, camera: { ...images.camera, view, field }, stars: [star] }
}

const place = (from: Vector, toward: Vector, roll = 0, allSky = false): PlaceViewSpec => ({
  from: from.map((component) => component * au) as Vector,
  toward: toward.map((component) => component * au) as Vector,
  roll: roll * degree,
  allSky
})

const cases: [string, CameraImages][] = [
  ['all-sky', imagesFrom(place([3, 4, 5], [0, 0, 0], 0, true), [360, 180], [24, 12])],
  ['all-sky-origin', imagesFrom(place([0, 0, 0], [0, 0, 0], 0, true), [360, 180], [15, 7])],
  ['perspective', imagesFrom(place([3, 4, 5], [-1, 2, 3]), [90, 60], [12, 9])],
  ['rolled', imagesFrom(place([3, -4, 5], [1, 2, 9], 35), [50, 100], [10, 12])],
  ['down', imagesFrom(place([0, 0, 5], [0, 0, 0]), [80, 80], [6, 6])],
  ['up', imagesFrom(place([2, 1, 5], [2, 1, 8], -20), [80, 80], [6, 6])]
]

function written(name: string, images: CameraImages): string {
  const path = join(folder, `${name}.fits`)
  writeFileSync(path, cameraFits(images, exampleScene()))
  return path
}

describe('FITS files of cameras at places of the scene', () => {
  itWith(fitsverify, 'have no error and no warning in fitsverify', () => {
    for (const [name, images] of cases) {
      const path = written(name, images)
      expect(execFileSync(fitsverify.command, [path], { encoding: 'utf8' })).toContain('found 0 warning(s) and 0 error(s)')
    }
  })

  // Longitude and latitude are angles of the direction in the frame of the scene: x = cos b cos l, y = cos b sin l, z = sin b.
  itWith(astropy, 'have every pixel where the camera looks, by astropy', () => {
    const script = `
import json, sys, numpy
from astropy.io import fits
from astropy.wcs import WCS
answer = []
for path in json.load(sys.stdin):
    with fits.open(path) as file:
        wcs = WCS(file[0].header, file).celestial
        ny, nx = file[0].data.shape[1:]
        y, x = numpy.mgrid[0:ny, 0:nx]
        l, b = wcs.pixel_to_world_values(x, y)
        west, _ = wcs.pixel_to_world_values(x - 0.5, y)
        east, _ = wcs.pixel_to_world_values(x + 0.5, y)
        _, low = wcs.pixel_to_world_values(x, y - 0.5)
        _, high = wcs.pixel_to_world_values(x, y + 0.5)
        width = (west - east + 540) % 360 - 180
        area = numpy.radians(width) * (numpy.sin(numpy.radians(high)) - numpy.sin(numpy.radians(low)))
        answer.append(dict(l=l.ravel().tolist(), b=b.ravel().tolist(), area=area.ravel().tolist(), types=[wcs.wcs.ctype[i] for i in (0, 1)],
                           star=[float(file['STARS'].data['longitude'][0]), float(file['STARS'].data['latitude'][0])]))
print(json.dumps(answer))
`
    const paths = cases.map(([name, images]) => written(name, images))
    const found = JSON.parse(runPython(script, JSON.stringify(paths)))
    cases.forEach(([name, images], n) => {
      const { view, field } = images.camera
      const { l, b, area, types, star } = found[n]
      const { allSky } = view as PlaceViewSpec
      const seen = placeView(view as PlaceViewSpec)
      const direction = new Float64Array(3)
      const angles = pixelSolidAngles(images.camera)
      expect(types).toEqual(allSky ? ['SCLN-CAR', 'SCLT-CAR'] : ['SCLN-TAN', 'SCLT-TAN'])
      for (let i = 0; i < l.length; i++) {
        const across = ((2 * (i % images.width) + 1) / images.width - 1) * 0.5
        const up = ((2 * Math.floor(i / images.width) + 1) / images.height - 1) * 0.5
        const x = allSky ? across * field[0] : 2 * across * Math.tan(field[0] / 2)
        const y = allSky ? Math.sin(up * field[1]) : 2 * up * Math.tan(field[1] / 2)
        directionAt(seen, x - seen.origin[0], y - seen.origin[1], direction)
        const [lon, lat] = [l[i] * degree, b[i] * degree]
        const apart = Math.hypot(
          direction[0] - Math.cos(lat) * Math.cos(lon),
          direction[1] - Math.cos(lat) * Math.sin(lon),
          direction[2] - Math.sin(lat)
        )
        expect(apart, `${name} ${i}`).toBeLessThan(1e-9)
        if (allSky) expect(angles[i]).toBeCloseTo(area[i], 10)
      }
      expect(star[0]).toBeCloseTo(200, 9)
      expect(star[1]).toBeCloseTo(-5, 9)
    })
  })

  it('cover 4 pi, or the solid angle of a pyramid', () => {
    const sum = (images: CameraImages) => pixelSolidAngles(images.camera).reduce((all, angle) => all + angle, 0)
    expect(sum(cases[0][1])).toBeCloseTo(4 * Math.PI, 10)
    // A right pyramid of apex angles a and b: 4 asin(sin(a / 2) sin(b / 2)) (geometry).
    for (const [, images] of cases.slice(2)) {
      const [a, b] = images.camera.field
      expect(sum(images)).toBeCloseTo(4 * Math.asin(Math.sin(a / 2) * Math.sin(b / 2)), 10)
    }
  })

  it('are drawn, to the same bytes again', () => {
    for (const [, images] of cases.slice(0, 4)) {
      const picture = cameraPicture(images, 0, exampleScene())
      expect(picture.length).toBeGreaterThan(10_000)
      expect(picture).toEqual(cameraPicture(images, 0, exampleScene()))
    }
  })
})
