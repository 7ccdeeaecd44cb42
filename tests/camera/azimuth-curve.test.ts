import { describe, expect, it } from 'vitest'
import { AzimuthCurve } from '../../src/camera/azimuth-curve.js'
import { henyeyGreenstein } from '../../src/dust/phase-function.js'
import { stream } from '../../src/math/random.js'
import { AZIMUTH_BINS, azimuthLookup } from '../../src/transport/scatter-medium.js'

describe.each([
  ['even', false],
  ['narrow forwards', true]
])('light between azimuth bins that are %s', (_, narrow) => {
  const edges = Array.from(azimuthLookup(narrow).edges, Math.acos)
  const curve = new AzimuthCurve(narrow, false)
  const points = 400

  /** A function of azimuth at even points of a bin. */
  const within = (bin: number, value: (azimuth: number) => number) =>
    Array.from({ length: points }, (_, i) => value(edges[bin] + ((i + 0.5) / points) * (edges[bin + 1] - edges[bin])))
  const mean = (values: number[]) => values.reduce((sum, value) => sum + value, 0) / values.length

  it('has the mean of every bin, and is nowhere negative at their edges', () => {
    const uniform = stream('azimuths')
    for (let n = 0; n < 20; n++) {
      // Every other time spikes of many powers of ten.
      const values = Float64Array.from({ length: AZIMUTH_BINS }, () => (n % 2 ? 10 ** (-6 * uniform()) : uniform()))
      const most = Math.max(...values)
      for (let bin = 0; bin < AZIMUTH_BINS; bin++) {
        const light = within(bin, (azimuth) => curve.at(values, 0, Math.cos(azimuth)))
        // A step of the table is 2.8 mrad, and each edge of a bin is known to half of one.
        const allowed = (0.0028 / (edges[bin + 1] - edges[bin])) * most
        expect(Math.abs(mean(light) - values[bin])).toBeLessThan(allowed)
        expect(light[0]).toBeGreaterThan(-allowed)
        expect(light[points - 1]).toBeGreaterThan(-allowed)
      }
    }
  })

  it('follows the law of Henyey and Greenstein from its means, and its odd part', () => {
    const law = (azimuth: number) => henyeyGreenstein(0.5, Math.cos(azimuth))
    const odd = (azimuth: number) => Math.sin(azimuth) + 0.3 * Math.sin(2 * azimuth)
    const means = Float64Array.from({ length: AZIMUTH_BINS }, (_, bin) => mean(within(bin, law)))
    const oddMeans = Array.from({ length: AZIMUTH_BINS }, (_, bin) => mean(within(bin, odd)))
    for (let azimuth = 0; azimuth <= Math.PI; azimuth += 0.01) {
      const light = curve.at(means, 0, Math.cos(azimuth))
      expect(Math.abs(light / law(azimuth) - 1)).toBeLessThan(0.02)
      const there = curve.odd.reduce((sum, share, i) => sum + share * oddMeans[curve.start + i], 0)
      expect(Math.abs(there - odd(azimuth))).toBeLessThan(0.01)
    }
    // Straight forwards, where straight lines are 3.6 % too low.
    expect(Math.abs(curve.at(means, 0, 1) / law(0) - 1)).toBeLessThan(0.01)
  })
})
