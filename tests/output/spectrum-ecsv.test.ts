import { describe, expect, it } from 'vitest'
import { ecsv } from '../../src/output/ecsv.js'
import { spectrumEcsv } from '../../src/output/spectrum-ecsv.js'
import { astropy, itWith, runPython } from '../support/python.js'
import { exampleScene, exampleSpectrum } from './examples.js'

describe('ecsv', () => {
  it('writes a header in comments, the names and the rows (Astropy Proposal for Enhancement 6)', () => {
    const text = ecsv([{ name: 'flux', unit: 'Jy', values: [1.5, Number.NaN] }], { title: 'a "b"', n: 3 })
    expect(text).toBe(
      [
        '# %ECSV 1.0',
        '# ---',
        '# datatype:',
        '# - {name: "flux", unit: "Jy", datatype: float64}',
        '# meta: {"title": "a \\"b\\"", "n": 3}',
        '# schema: astropy-2.0',
        'flux',
        '1.5',
        'nan',
        ''
      ].join('\n')
    )
  })
})

describe('spectrumEcsv', () => {
  // 1 Jy = 1e-23 erg/s/cm2/Hz by definition.
  const wavelengths = [0.55e-4, 1e-2]
  const flux = [2e-23, 5e-23]

  itWith(astropy, 'is read by astropy with units, whatever the unit', () => {
    for (const unit of ['Jy', 'W/m2/Hz', 'erg/s/cm2/angstrom', 'W/m2/um', 'mag']) {
      const text = spectrumEcsv(exampleSpectrum(wavelengths, flux, unit), exampleScene({ title: "It's: #1 {ü}" }))
      const script = `
import json, sys, warnings
warnings.simplefilter('error')
import astropy.units as u
from astropy.table import Table
table = Table.read(sys.stdin.read(), format='ascii.ecsv')
wavelength = table['wavelength'].quantity
flux = table['flux'].quantity if str(table['flux'].unit) != 'mag' else [float(v) for v in table['flux']] * u.ABmag
jansky = [float(f.to_value(u.Jy, equivalencies=u.spectral_density(w))) for f, w in zip(flux, wavelength)]
print(json.dumps(dict(names=table.colnames, jansky=jansky, wavelength=list(wavelength.to_value('cm')), title=table.meta['title'])))
`
      const found = JSON.parse(runPython(script, text))
      expect(found.names).toEqual(['wavelength', 'flux', 'sigma', 'direct', 'emitted', 'scattered'])
      expect(found.title).toBe("It's: #1 {ü}")
      found.wavelength.forEach((value: number, k: number) => {
        expect(value / wavelengths[k]).toBeCloseTo(1, 12)
      })
      expect(found.jansky[0]).toBeCloseTo(2, 9)
      expect(found.jansky[1]).toBeCloseTo(5, 9)
    }
  })

  it('gives errors and parts in the unit of the flux', () => {
    const rows = spectrumEcsv(exampleSpectrum(wavelengths, flux), exampleScene()).trim().split('\n').slice(-2)
    const numbers = rows.map((row) => row.split(' ').map(Number))
    expect(numbers[0][0]).toBe(0.55)
    ;[2, 0.2, 1, 1, 0].forEach((value, i) => {
      expect(numbers[0][i + 1]).toBeCloseTo(value, 12)
    })
  })
})
