import { describe, expect, it } from 'vitest'
import { type LightWeights, lightWeights } from '../../src/observe/band.js'
import type { LightSpec } from '../../src/observe/types.js'
import { askPython, itWith, outsideTool } from '../support/python.js'

const synphot = outsideTool('python3-synphot', '/usr/bin/python3', ['-c', 'import synphot'])
const shown = (wavelength: number) => `${wavelength}`
const hat = (from: number, to: number, weighting: 'photon' | 'energy' = 'photon'): LightSpec => ({
  kind: 'band',
  wavelength: new Float64Array([from, to]),
  response: new Float64Array([1, 1]),
  weighting
})
const mean = ({ weights }: LightWeights, values: ArrayLike<number>) =>
  weights.reduce((sum, weight, k) => sum + weight * values[k], 0)

/** 2401 wavelengths from 0.3 to 3 um, and a spectrum (Jy) with a slope and a feature. */
const wavelengths = Array.from({ length: 2401 }, (_, k) => 0.3e-4 * 10 ** (k / 2400))
const spectrum = wavelengths.map((cm) => 3 * (cm / 1e-4) ** 1.7 * (1 + 0.8 * Math.exp(-(((cm / 1e-4 - 1.02) / 0.05) ** 2))))

describe('bands', () => {
  itWith(synphot, 'give the fluxes, AB magnitudes and pivot wavelengths of synphot', () => {
    const bell = Float64Array.from({ length: 81 }, (_, i) => Math.exp(-(((i - 35) / 14) ** 2)) - Math.exp(-((35 / 14) ** 2)))
    const tables = [
      {
        wavelength: Float64Array.from({ length: 81 }, (_, i) => (0.9 + 0.004 * i) * 1e-4),
        response: bell.map((v) => Math.max(0, v))
      },
      { wavelength: new Float64Array([0.5e-4, 0.51e-4, 0.7e-4, 0.72e-4]), response: new Float64Array([0, 0.8, 0.3, 0]) },
      { wavelength: new Float64Array([1.9e-4, 1.9001e-4, 2.4e-4, 2.4001e-4]), response: new Float64Array([0, 1, 1, 0]) }
    ]
    // Ours a photon; the same table read as an energy response is R / wavelength a photon.
    const theirs = askPython<{ jy: number; ab: number; pivot: number; energy: number; energyPivot: number }[]>(
      `import numpy as np, astropy.units as u
from synphot import SourceSpectrum, SpectralElement, Observation
from synphot.models import Empirical1D
w = np.array(data['wavelengths']) * 1e8
source = SourceSpectrum(Empirical1D, points=w * u.AA, lookup_table=np.array(data['spectrum']) * u.Jy)
answer = []
for t in data['tables']:
    bw, br = np.array(t['wavelength']) * 1e8, np.array(t['response'])
    fine = np.unique(np.concatenate([np.linspace(bw[0], bw[-1], 40001), bw]))
    r = np.interp(fine, bw, br)
    one = lambda throughput: SpectralElement(Empirical1D, points=fine * u.AA, lookup_table=throughput)
    photon, energy = one(r), one(r / fine * fine[0])
    o, e = Observation(source, photon, binset=fine * u.AA), Observation(source, energy, binset=fine * u.AA)
    answer.append(dict(jy=o.effstim(u.Jy, wavelengths=fine * u.AA).value, ab=o.effstim(u.ABmag, wavelengths=fine * u.AA).value,
        pivot=photon.pivot(wavelengths=fine * u.AA).value, energy=e.effstim(u.Jy, wavelengths=fine * u.AA).value, energyPivot=energy.pivot(wavelengths=fine * u.AA).value))`,
      { wavelengths, spectrum, tables: tables.map((t) => ({ wavelength: [...t.wavelength], response: [...t.response] })) }
    )
    tables.forEach((table, i) => {
      const photon = lightWeights({ kind: 'band', ...table, weighting: 'photon' }, wavelengths, shown)
      const energy = lightWeights({ kind: 'band', ...table, weighting: 'energy' }, wavelengths, shown)
      expect(mean(photon, spectrum) / theirs[i].jy, `band ${i}`).toBeCloseTo(1, 5)
      expect(-2.5 * Math.log10(mean(photon, spectrum)) + 8.9, `band ${i}`).toBeCloseTo(theirs[i].ab, 5)
      expect((photon.wavelength * 1e8) / theirs[i].pivot, `band ${i}`).toBeCloseTo(1, 6)
      expect(mean(energy, spectrum) / theirs[i].energy, `band ${i}`).toBeCloseTo(1, 5)
      expect((energy.wavelength * 1e8) / theirs[i].energyPivot, `band ${i}`).toBeCloseTo(1, 6)
    })
  })

  it('have the closed forms of top hats: a flat spectrum, one linear in ln(wavelength), the pivot', () => {
    const nodes = [1e-4, 1.3e-4, 1.9e-4, 2.5e-4]
    const photon = lightWeights(hat(1.2e-4, 2.1e-4), nodes, shown)
    expect(mean(photon, [7, 7, 7, 7])).toBeCloseTo(7, 13)
    // int ln(l) dl/l / int dl/l is the mean of the ends in ln(l).
    const logs = nodes.map(Math.log)
    expect(mean(photon, logs)).toBeCloseTo((Math.log(1.2e-4) + Math.log(2.1e-4)) / 2, 10)
    // int l dl / int dl/l = (b^2 - a^2) / (2 ln(b/a)); an energy response: int dl / int dl/l^2 = a b.
    expect(photon.wavelength).toBeCloseTo(Math.sqrt((2.1 ** 2 - 1.2 ** 2) / 2 / Math.log(2.1 / 1.2)) * 1e-4, 12)
    expect(lightWeights(hat(1.2e-4, 2.1e-4, 'energy'), nodes, shown).wavelength).toBeCloseTo(Math.sqrt(1.2 * 2.1) * 1e-4, 12)
  })

  it('tell the error of interpolation: a third of what every second wavelength changes', () => {
    const curved = (cm: number) => Math.log(cm / 1e-4) ** 2
    const exact = Math.log(2) ** 2 / 3
    const nodes = Array.from({ length: 17 }, (_, k) => 1e-4 * 2 ** (k / 16))
    const { weights, coarse } = lightWeights(hat(1e-4, 2e-4), nodes, shown)
    const [fine, rough] = [weights, coarse].map((w) => w.reduce((sum, weight, k) => sum + weight * curved(nodes[k]), 0))
    expect((rough - fine) / 3 / (fine - exact)).toBeCloseTo(1, 1)
  })

  it('one wavelength is one of the model, and a band lies inside them', () => {
    const nodes = [1e-4, 2e-4]
    expect([...lightWeights({ kind: 'line', wavelength: 2e-4 * (1 + 1e-9) }, nodes, shown).weights]).toEqual([0, 1])
    expect(() => lightWeights({ kind: 'line', wavelength: 1.5e-4 }, nodes, shown)).toThrow('there are 0.0001, 0.0002')
    expect(() => lightWeights(hat(0.9e-4, 1.5e-4), nodes, shown)).toThrow('reaches from')
    expect(() => lightWeights(hat(1.1e-4, 2.1e-4), nodes, shown)).toThrow('reaches from')
    expect(() => lightWeights(hat(1e-4, 2e-4), [1.5e-4], shown)).toThrow('reaches from')
  })
})
