import { execFileSync } from 'node:child_process'
import { writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { PNG } from 'pngjs'
import { describe, expect, it } from 'vitest'
import { stokesPlanes } from '../../src/camera/stokes-planes.js'
import { cameraFits } from '../../src/output/fits/camera-fits.js'
import { azimuthalPicture, azimuthalStokes } from '../../src/output/png/azimuthal-picture.js'
import { polarisationTicks } from '../../src/output/png/polarisation-ticks.js'
import { polarisedPicture } from '../../src/output/png/polarised-picture.js'
import { spectrumEcsv } from '../../src/output/spectrum-ecsv.js'
import { folderWith } from '../support/folder-with.js'
import { astropy, fitsverify, itWith, runPython } from '../support/python.js'
import { exampleImages, exampleScene, exampleSpectrum } from './examples.js'

const folder = folderWith()

/** Wholly azimuthal about the middle of an 8 x 8 image, 40 % of 1 MJy/sr: Q = -0.4 cos 2 phi, U = -0.4 sin 2 phi. */
const swirl = (unit = 'MJy/sr') =>
  exampleImages(() => 1e-17, {
    pixels: [8, 8],
    fieldArcsec: [8, 8],
    unit,
    wavelengths: [1e-4],
    polarised: (x, y) => {
      const phi = Math.atan2(3.5 - x, y - 3.5)
      return [-0.4e-17 * Math.cos(2 * phi), -0.4e-17 * Math.sin(2 * phi)]
    }
  })

describe('FITS extensions Q, U and V', () => {
  itWith(fitsverify, 'have no error and no warning in fitsverify', () => {
    for (const unit of ['MJy/sr', 'mag/arcsec2']) {
      const file = join(folder, 'polarised.fits')
      writeFileSync(file, cameraFits(swirl(unit), exampleScene()))
      expect(execFileSync(fitsverify.command, [file], { encoding: 'utf8' })).toContain('found 0 warning(s) and 0 error(s)')
    }
  })

  itWith(astropy, 'are read by astropy with unit, errors and convention; beside magnitudes in MJy/sr', () => {
    for (const unit of ['MJy/sr', 'mag/arcsec2']) {
      const file = join(folder, 'astropy.fits')
      writeFileSync(file, cameraFits(swirl(unit), exampleScene()))
      const script = `
import json, sys
from astropy.io import fits
from astropy.wcs import WCS
with fits.open(sys.stdin.read(), checksum=True) as file:
    names = [hdu.name for hdu in file]
    hdus = [file[n] for n in ('Q', 'SIGMA_Q', 'U', 'SIGMA_U', 'V', 'SIGMA_V')]
    print(json.dumps(dict(names=names, units=[h.header['BUNIT'] for h in hdus], convention=[h.header['POLCCONV'] for h in hdus],
        east=[float(h.data[0, 3, 0]) for h in hdus], ra=float(WCS(file['Q'].header, file).pixel_to_world_values(3.5, 3.5, 0)[0]))))
`
      const found = JSON.parse(runPython(script, file))
      expect(found.names.slice(5, 11)).toEqual(['Q', 'SIGMA_Q', 'U', 'SIGMA_U', 'V', 'SIGMA_V'])
      expect(new Set(found.units)).toEqual(new Set(['MJy/sr']))
      expect(new Set(found.convention)).toEqual(new Set(['IAU']))
      // Column 0 is east: an azimuthal electric vector is north-south there, nearly: Q = +0.4 cos(2 x 8.13 deg).
      const [q, sigmaQ, u, , v, sigmaV] = found.east
      expect(q).toBeCloseTo(0.4 * Math.cos(2 * Math.atan2(0.5, 3.5)), 12)
      expect(Math.abs(u)).toBeCloseTo(0.4 * Math.sin(2 * Math.atan2(0.5, 3.5)), 12)
      expect([sigmaQ, v, sigmaV]).toEqual([0.001, 0.01, 0.001].map((value) => expect.closeTo(value, 12)))
      expect(found.ra).toBeCloseTo(84.21, 9)
    }
  })
})

describe('flux columns q and u', () => {
  itWith(astropy, 'are read by astropy, in Jy beside magnitudes', () => {
    for (const unit of ['Jy', 'mag']) {
      const spectrum = exampleSpectrum([1e-4], [2e-23], unit)
      spectrum.stokes = stokesPlanes(1)
      spectrum.stokes.q[0] = -0.1e-23
      spectrum.stokes.sigmaU[0] = 0.02e-23
      const script = `
import json, sys
from astropy.table import QTable
import astropy.units as u
table = QTable.read(sys.stdin.read(), format='ascii.ecsv')
print(json.dumps([table.colnames[6:], float(table['q'][0].to_value(u.Jy)), float(table['sigma_u'][0].to_value(u.Jy))]))
`
      const [names, q, sigma] = JSON.parse(runPython(script, spectrumEcsv(spectrum, exampleScene())))
      expect(names).toEqual(['q', 'sigma_q', 'u', 'sigma_u'])
      expect(q).toBeCloseTo(-0.1, 12)
      expect(sigma).toBeCloseTo(0.02, 12)
    }
  })
})

describe('azimuthal Stokes parameters', () => {
  it('of azimuthal light are Q_phi = its polarised intensity and U_phi = 0', () => {
    const { q, u } = azimuthalStokes(swirl(), 0)
    for (let i = 0; i < 64; i++) {
      expect(q[i] / 1e-17).toBeCloseTo(0.4, 12)
      expect(u[i] / 1e-17).toBeCloseTo(0, 12)
    }
  })
})

describe('pictures of polarised light', () => {
  const size = (bytes: Uint8Array) => PNG.sync.read(Buffer.from(bytes))
  const panel = { left: 0, top: 0, width: 80, height: 80, auPerPixel: 1, light: false }
  const ends = (line: string) => [...line.matchAll(/[xy][12]="([-\d.]+)"/g)].map(([, value]) => Number(value))

  it('have ticks along the electric vector', () => {
    // Everywhere at position angle 45 deg: from north-east, up and to the left, to south-west.
    const slanted = exampleImages(() => 1e-17, { pixels: [8, 8], wavelengths: [1e-4], polarised: () => [0, 0.3e-17] })
    const { marks, note } = polarisationTicks(slanted, 0)
    const lines = marks(panel)
    expect(lines).toHaveLength(2 * 64)
    for (const line of lines) {
      const [x1, y1, x2, y2] = ends(line)
      expect((y2 - y1) / (x2 - x1)).toBeCloseTo(1, 2)
    }
    expect(note).toContain('20 % polarised')
  })

  it('have none where the error is as large', () => {
    const noisy = swirl()
    noisy.stokes!.sigmaQ.fill(1e-17)
    expect(polarisationTicks(noisy, 0).marks(panel)).toEqual([])
  })

  it('are drawn for any unit, and when nothing is polarised', () => {
    const dark = exampleImages(() => 0, { pixels: [8, 8], wavelengths: [1e-4], polarised: () => [0, 0] })
    for (const images of [swirl(), swirl('mag/arcsec2'), swirl('K'), dark]) {
      for (const bytes of [polarisedPicture(images, 0, exampleScene()), azimuthalPicture(images, 0, exampleScene(), 'u')])
        expect(size(bytes).width).toBeGreaterThan(600)
    }
  })

  it('show Q_phi > 0 in red and U_phi = 0 in nearly white', () => {
    const at = (bytes: Uint8Array) => {
      const { data, width, height } = size(bytes)
      const i = 4 * ((height >> 1) * width + 300)
      return [...data.subarray(i, i + 3)]
    }
    const [red, , blue] = at(azimuthalPicture(swirl(), 0, exampleScene(), 'q'))
    expect(red).toBeGreaterThan(2 * blue)
    for (const channel of at(azimuthalPicture(swirl(), 0, exampleScene(), 'u'))) expect(channel).toBeGreaterThan(230)
  })
})
