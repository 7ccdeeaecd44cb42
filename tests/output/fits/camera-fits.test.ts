import { execFileSync } from 'node:child_process'
import { writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { cameraFits } from '../../../src/output/fits/camera-fits.js'
import { cellsFits } from '../../../src/output/fits/cells-fits.js'
import { imageHdu } from '../../../src/output/fits/image.js'
import { tableHdu } from '../../../src/output/fits/table.js'
import { folderWith } from '../../support/folder-with.js'
import { astropy, fitsverify, itWith, runPython } from '../../support/python.js'
import { exampleImages, exampleScene } from '../examples.js'

const folder = folderWith()

function written(name: string, bytes: Uint8Array): string {
  const path = join(folder, name)
  writeFileSync(path, bytes)
  return path
}

// MJy/sr is 1e-17 erg/s/cm2/Hz/sr by definition, so values are x + 10 y + 100 k MJy/sr.
const images = exampleImages((x, y, k) => (x + 10 * y + 100 * k) * 1e-17, { wavelengths: [870e-4, 0.55e-4] })

const column = { density: Float64Array.from({ length: 24 }, (_, i) => i / 1000), samplingError: 1e-3 }

describe('FITS bytes', () => {
  it('are blocks of 2880 with a header in ASCII and big-endian data', () => {
    const bytes = imageHdu('primary', [3], new Float64Array([1, -2, Number.POSITIVE_INFINITY]), [])
    expect(bytes.length).toBe(2 * 2880)
    expect(new TextDecoder().decode(bytes.subarray(0, 30))).toBe('SIMPLE  =                    T')
    // IEEE 754: 1 = 3ff0..., -2 = c000..., NaN = 7ff8...
    expect([...bytes.subarray(2880, 2880 + 24)].map((b) => b.toString(16).padStart(2, '0')).join('')).toBe(
      '3ff0000000000000c0000000000000007ff8000000000000'
    )
    expect(bytes.subarray(2880 + 24).every((b) => b === 0)).toBe(true)
  })

  it('of a table go row by row', () => {
    const bytes = tableHdu('T', [
      { name: 'a', values: new Float64Array([1, 2]) },
      { name: 'b', values: new Float64Array([3, 4]) }
    ])
    const view = new DataView(bytes.buffer, 2880)
    expect([0, 8, 16, 24].map((at) => view.getFloat64(at))).toEqual([1, 3, 2, 4])
  })

  it('repeat for the same input', () => {
    expect(cameraFits(images, exampleScene())).toEqual(cameraFits(images, exampleScene()))
  })

  it('refuse columns of different length', () => {
    const columns = [
      { name: 'a', values: new Float64Array(2) },
      { name: 'b', values: new Float64Array(3) }
    ]
    expect(() => cellsFits(columns, exampleScene())).toThrow(RangeError)
  })
})

describe('FITS files', () => {
  itWith(fitsverify, 'have no error and no warning in fitsverify', () => {
    const magnitudes = exampleImages((x) => x * 1e-17, { unit: 'mag/arcsec2', wavelengths: [2.2e-4] })
    const columns = [{ name: 'density_inner wind', unit: 'g cm-3', values: new Float64Array([1, 2, 3]) }]
    const files = [
      written('camera.fits', cameraFits(images, exampleScene())),
      written('column.fits', cameraFits({ ...images, column }, exampleScene({ sky: undefined }))),
      written('no-sky.fits', cameraFits(magnitudes, exampleScene({ sky: undefined, title: `It's ü ${'x'.repeat(90)}` }))),
      written('cells.fits', cellsFits(columns, exampleScene()))
    ]
    for (const file of files) {
      expect(execFileSync(fitsverify.command, [file], { encoding: 'utf8' })).toContain('found 0 warning(s) and 0 error(s)')
    }
  })

  itWith(astropy, 'are read by astropy: checksums, values, units, celestial and wavelength coordinates', () => {
    const path = written('astropy.fits', cameraFits(images, exampleScene()))
    const script = `
import json, sys, warnings
warnings.simplefilter('error')
import astropy.units as u
from astropy.io import fits
from astropy.wcs import WCS
with fits.open(sys.stdin.read(), checksum=True) as file:
    result = []
    for hdu in file[:5]:
        wcs = WCS(hdu.header, file)
        centre, north, east = [[float(v) for v in wcs.pixel_to_world_values(*p)] for p in [(2.5, 1.5, 0), (2.5, 2.5, 1), (1.5, 1.5, 1)]]
        scale = [float(wcs.proj_plane_pixel_scales()[i].to_value(u.arcsec)) for i in (0, 1)]
        size = float(u.Unit(hdu.header['BUNIT'], format='fits').to('erg s-1 cm-2 Hz-1 sr-1'))
        result.append(dict(name=hdu.name, centre=centre, north=north, east=east, scale=scale, size=size,
                           value=float(hdu.data[1, 2, 3]), shape=hdu.data.shape))
    header = {k: file[0].header[k] for k in ('OBJECT', 'ORIGIN', 'DIST_PC', 'INCLIN', 'RADESYS')}
    print(json.dumps(dict(hdus=result, header=header)))
`
    const { hdus, header } = JSON.parse(runPython(script, path))
    expect(hdus.map((hdu: { name: string }) => hdu.name)).toEqual(['TOTAL', 'SIGMA', 'DIRECT', 'EMITTED', 'SCATTERED'])
    const expected = [123, 1.23, 0, 61.5, 61.5]
    for (const [i, hdu] of hdus.entries()) {
      expect(hdu.shape).toEqual([2, 4, 6])
      expect(hdu.value).toBeCloseTo(expected[i], 10)
      expect(hdu.size).toBeCloseTo(1e-17, 30)
      expect(hdu.scale[0]).toBeCloseTo(2, 9)
      expect(hdu.scale[1]).toBeCloseTo(2, 9)
      expect(hdu.centre[0]).toBeCloseTo(84.21, 10)
      expect(hdu.centre[1]).toBeCloseTo(-31.7, 10)
      expect(hdu.centre[2]).toBeCloseTo(870e-6, 15)
      // One pixel up is 2 arcsec north; one pixel to the left is 2 arcsec / cos(dec) east (small angles: 1e-4 of it).
      expect(hdu.north[1] - hdu.centre[1]).toBeCloseTo(2 / 3600, 8)
      expect(hdu.north[2]).toBeCloseTo(0.55e-6, 15)
      expect(hdu.east[0] - hdu.centre[0]).toBeCloseTo(2 / 3600 / Math.cos((31.7 * Math.PI) / 180), 8)
    }
    expect(header).toEqual({ OBJECT: 'Example source', ORIGIN: 'motelight', DIST_PC: 250, INCLIN: 35, RADESYS: 'ICRS' })
  })

  itWith(astropy, 'hold the column density as one image with celestial coordinates, by astropy', () => {
    const path = written('column-astropy.fits', cameraFits({ ...images, column }, exampleScene()))
    const script = `
import json, sys, warnings
warnings.simplefilter('error')
import astropy.units as u
from astropy.io import fits
from astropy.wcs import WCS
with fits.open(sys.stdin.read()) as file:
    hdu = file['COLUMN']
    kg = (hdu.data[2, 3] * u.Unit(hdu.header['BUNIT'], format='fits')).to_value('kg/m2')
    print(json.dumps(dict(kg=float(kg), shape=hdu.data.shape, centre=[float(v) for v in WCS(hdu.header).pixel_to_world_values(2.5, 1.5)])))
`
    const found = JSON.parse(runPython(script, path))
    // Row 2, column 3 of 6: element 15, 0.015 g/cm2.
    expect(found.kg).toBeCloseTo(0.15, 12)
    expect(found.shape).toEqual([4, 6])
    expect(found.centre[0]).toBeCloseTo(84.21, 10)
    expect(found.centre[1]).toBeCloseTo(-31.7, 10)
  })

  itWith(astropy, 'give the wavelength of a single image and magnitudes, by astropy', () => {
    const magnitudes = exampleImages((x) => x * 1e-17, { unit: 'mag/arcsec2', wavelengths: [2.2e-4] })
    const path = written('single.fits', cameraFits(magnitudes, exampleScene({ sky: undefined })))
    const script = `
import json, sys, numpy
import astropy.units as u
from astropy.io import fits
from astropy.wcs import WCS
with fits.open(sys.stdin.read()) as file:
    wavelength = float(WCS(file[0].header, file).pixel_to_world_values(0, 0, 0)[2])
    row = file[0].data[0, 0]
    flux = (row[1] * u.ABmag).to_value(u.Jy)
    print(json.dumps(dict(wavelength=wavelength, dark=bool(numpy.isnan(row[0])), jansky=float(flux), comment=str(file[0].header['COMMENT']))))
`
    const found = JSON.parse(runPython(script, path))
    expect(found.wavelength).toBeCloseTo(2.2e-6, 15)
    expect(found.dark).toBe(true)
    // 1 MJy/sr is 23.5044305390979 uJy/arcsec2 (astropy); the AB zero point as 3631 Jy or as 48.60 mag differs by 6.6e-5 mag.
    expect(found.jansky).toBeCloseTo(23.5044305390979e-6, 8)
    expect(found.comment).toContain('placeholders')
  })

  itWith(astropy, 'hold the cells with their units, by astropy', () => {
    const columns = [
      { name: 'r', unit: 'AU', values: new Float64Array([1, 2]) },
      { name: 'density_dust', unit: 'g cm-3', values: new Float64Array([1e-15, 2e-15]) }
    ]
    const path = written('cells-astropy.fits', cellsFits(columns, exampleScene()))
    const script = `
import json, sys
from astropy.table import Table
table = Table.read(sys.stdin.read())
print(json.dumps([[float(v) for v in table['r'].quantity.to_value('km')], list(table['density_dust']), str(table['density_dust'].unit)]))
`
    const [km, density, unit] = JSON.parse(runPython(script, path))
    // 1 au = 149597870.7 km, IAU 2012 Resolution B2.
    expect(km[0]).toBeCloseTo(149597870.7, 5)
    expect(density).toEqual([1e-15, 2e-15])
    expect(unit).toBe('g / cm3')
  })
})
