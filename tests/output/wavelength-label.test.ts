import { describe, expect, it } from 'vitest'
import { wavelengthLabel, wavelengthLabels } from '../../src/output/wavelength-label.js'

describe('wavelengthLabel', () => {
  it('is short and in the unit people use', () => {
    const cases: [number, string][] = [
      [0.55e-4, '0.55um'],
      [870e-4, '870um'],
      [0.13, '1.3mm'],
      [0.09999, '1mm'],
      [21, '21cm'],
      [1.2345e-3, '12.3um']
    ]
    for (const [cm, label] of cases) expect(wavelengthLabel(cm)).toBe(label)
  })

  it('grows digits only where two would be alike', () => {
    expect(wavelengthLabels([2.2e-4, 2.2001e-4, 870e-4])).toEqual(['2.2um', '2.2001um', '870um'])
    const many = Array.from({ length: 300 }, (_, i) => 1e-4 * (1 + i * 1e-5))
    expect(new Set(wavelengthLabels(many)).size).toBe(300)
  })
})
