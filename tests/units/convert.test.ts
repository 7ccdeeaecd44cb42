import { describe, expect, it, test } from 'vitest'
import { ARCSECOND } from '../../src/units/angles.js'
import { type Circumstances, ConversionError, convert } from '../../src/units/convert.js'
import { fluxUnits } from '../../src/units/flux.js'
import { intensityUnits } from '../../src/units/intensity.js'
import { gaussianBeamSr, solidAngleUnits } from '../../src/units/solid-angle.js'
import { askPython, astropy, itWith } from '../support/python.js'

const all: Circumstances = {
  wavelength: { frequencyHz: 345e9 },
  beam: { sr: gaussianBeamSr(0.3 * ARCSECOND, 0.2 * ARCSECOND) },
  pixel: { sr: (0.05 * ARCSECOND) ** 2 }
}

describe('convert', () => {
  itWith(astropy, 'every pair of units of intensity, of flux density and of solid angle as astropy does', () => {
    const kinds = [intensityUnits, fluxUnits, [...Object.keys(solidAngleUnits), 'beam', 'pixel']]
    const pairs = kinds.flatMap((names, kind) => names.flatMap((from) => names.map((to) => ({ kind, from, to }))))
    const across = ['MJy/sr', 'K', 'mag/arcsec2', 'mJy/beam'].flatMap((from) =>
      ['Jy', 'mag'].map((to) => ({ kind: 3, from, to }))
    )
    // astropy.units with its brightness_temperature, spectral_density and beam_angular_area equivalencies.
    const theirs = askPython<number[]>(
      `import astropy.units as u
nu = data['nu'] * u.Hz; beam = data['beam'] * u.sr; pixel = data['pixel'] * u.sr
areas = u.beam_angular_area(beam)
I0, F0 = u.Unit('erg s-1 cm-2 Hz-1 sr-1'), u.Unit('erg s-1 cm-2 Hz-1')
def unit(name): return u.Unit({'pixel': 'pix'}.get(name, name.replace('/pixel', '/pix').replace('angstrom', 'Angstrom')))
def cgs(x, name, kind):
    if kind == 2: return (x * {'beam': beam, 'pixel': pixel}.get(name, 1 * unit(name) if name not in ('beam', 'pixel') else None)).to_value(u.sr)
    if name == 'mag': return (x * u.ABmag).to_value(F0)
    if name == 'mag/arcsec2': return ((x * u.ABmag).to(F0) / u.arcsec**2).to_value(I0)
    if name in ('W/m2', 'erg/s/cm2') : return (x * unit(name) / nu).to_value(F0)
    if kind == 1: return (x * unit(name)).to(F0, u.spectral_density(nu)).value
    if name.endswith('/beam'): return (x * unit(name)).to(u.Jy / u.sr, areas).to_value(I0)
    if name.endswith('/pixel'): return (x * unit(name) * u.pix / pixel).to_value(I0)
    return (x * unit(name)).to(I0, u.brightness_temperature(nu)).value
def back(y, name, kind):
    if kind == 2: return y * u.sr / {'beam': beam, 'pixel': pixel}.get(name, 1 * u.Unit('sr')) if name in ('beam', 'pixel') else (y * u.sr).to(unit(name))
    if name == 'mag': return (y * F0).to(u.ABmag)
    if name == 'mag/arcsec2': return (y * I0 * u.arcsec**2).to(u.ABmag)
    if name in ('W/m2', 'erg/s/cm2'): return (y * F0 * nu).to(unit(name))
    if kind == 1: return (y * F0).to(unit(name), u.spectral_density(nu))
    if name.endswith('/beam'): return (y * I0).to(u.Jy / u.sr).to(unit(name), areas)
    if name.endswith('/pixel'): return (y * I0 * pixel / u.pix).to(unit(name))
    return (y * I0).to(unit(name), u.brightness_temperature(nu))
def one(p):
    if p['kind'] == 3: return back(cgs(2.5, p['from'], 0) * data['beam'], p['to'], 1)
    return back(cgs(2.5, p['from'], p['kind']), p['to'], p['kind'])
answer = [float(one(p).value) for p in data['pairs']]`,
      { nu: all.wavelength!.frequencyHz, beam: all.beam!.sr, pixel: all.pixel!.sr, pairs: [...pairs, ...across] }
    )
    expect(pairs).toHaveLength(15 * 15 + 10 * 10 + 7 * 7)
    for (const [i, { from, to }] of [...pairs, ...across].entries()) {
      const { value } = convert(`2.5 ${from}`, to, all)
      // Magnitudes pass through zero: absolute there, relative elsewhere.
      if (to.startsWith('mag')) expect(value - theirs[i], `${from} to ${to}`).toBeCloseTo(0, 9)
      else expect(value / theirs[i], `${from} to ${to}`).toBeCloseTo(1, 11)
    }
  })

  it('asks for nothing that does not matter', () => {
    expect(convert('3.2 mJy/beam', 'Jy/beam', {}).value).toBeCloseTo(0.0032, 15)
    expect(convert('1 W/m2/um', 'erg/s/cm2/angstrom', {}).value).toBeCloseTo(0.1, 12)
    // A beam filled with 5 mJy/beam holds 5 mJy, whatever its size.
    expect(convert('5 mJy/beam', 'Jy', {}).value).toBeCloseTo(0.005, 15)
    expect(convert('2 Jy', 'mJy/pixel', { pixel: all.pixel }).value).toBeCloseTo(2000, 9)
    expect(convert(' .5e1\u00a0\u00b5Jy ', 'mJy', {})).toMatchObject({ number: 5, from: 'uJy', to: 'mJy' })
  })

  test.each([
    ['3.2 mJy/beam', 'MJy/sr', {}, /without a beam/],
    ['3.2 mJy/beam', 'K', {}, /without a wavelength .* and a beam/],
    ['1 mJy/beam', 'uJy/pixel', { beam: all.beam }, /without a pixel/],
    ['1 Jy', 'MJy/sr', {}, /without a beam .* or a pixel/],
    ['1 Jy/beam', 'Jy', { pixel: all.pixel }, /without a beam \([^)]*\)$/],
    ['1 Jy', 'W/m2', {}, /without a wavelength/],
    ['1 sr', 'Jy', all, /solid angle/],
    ['-1 Jy', 'mag', {}, /nothing shines/],
    ['1 mJy/baem', 'Jy', {}, /did you mean `mJy\/beam`/],
    ['1', 'Jy', {}, /unit is missing/],
    ['much', 'Jy', {}, /not a number with a unit/]
  ] as [string, string, Circumstances, RegExp][])('%s to %s is refused', (text, to, given, message) => {
    expect(() => convert(text, to, given)).toThrow(ConversionError)
    expect(() => convert(text, to, given)).toThrow(message)
  })
})
