import { describe, expect, it } from 'vitest'
import { integrateAperture } from '../../src/camera/aperture.js'
import { EMITTED } from '../../src/camera/ray-values.js'
import { fieldOf, rim } from './fields.js'

describe('integrateAperture', () => {
  it('finds a rim a thousandth of its radius wide', () => {
    const { value, error } = integrateAperture(rim.field, Number.POSITIVE_INFINITY, 1e-3, true)
    expect(Math.abs(value[EMITTED] / rim.integral - 1)).toBeLessThan(1e-3)
    expect(error).toBeLessThan(1e-3 * value[EMITTED])
  })

  it('finds the same rim on a disk tilted by 60 deg, and tells the error', () => {
    const tilted = fieldOf(
      (x, y) => {
        const r = Math.hypot(x, 2 * y)
        return r < 1 || r > 100 ? 0 : r < 1.001 ? 1000 : 1 / (r * r)
      },
      [...rim.field.radii],
      0.5
    )
    const { value, error } = integrateAperture(tilted, Number.POSITIVE_INFINITY, 1e-3, true)
    expect(Math.abs((2 * value[EMITTED]) / rim.integral - 1)).toBeLessThan(1e-3)
    expect(error).toBeLessThan(1e-3 * value[EMITTED])
  })

  it('needs few rays for a smooth disk, whatever its tilt', () => {
    // Plummer's law: I = (1 + r^2)^-2, flux pi R^2 / (1 + R^2) within R, times the axis ratio.
    const radii = Array.from({ length: 100 }, (_, i) => 0.01 * 1.1 ** i)
    const edge = radii[99]
    for (const flattening of [1, 0.7, 0.2]) {
      const plain = fieldOf(
        (x, y) => (x * x + (y / flattening) ** 2 < edge * edge ? (1 + x * x + (y / flattening) ** 2) ** -2 : 0),
        radii,
        flattening
      )
      let rays = 0
      const counted = {
        ...plain,
        sample: (...of: Parameters<typeof plain.sample>) => {
          rays++
          plain.sample(...of)
        }
      }
      const { value } = integrateAperture(counted, Number.POSITIVE_INFINITY, 1e-3, true)
      expect(Math.abs(value[EMITTED] / ((flattening * Math.PI * edge * edge) / (1 + edge * edge)) - 1)).toBeLessThan(1e-3)
      expect(rays).toBeLessThan(5000)
    }
  })

  it('is exact for chords through spheres, square roots of the distance to their edges', () => {
    // Volumes of spheres of radius 1 and 3: the integral of the chord over the picture.
    const spheres = fieldOf(
      (x, y) => [1, 3].reduce((sum, r) => sum + 2 * Math.sqrt(Math.max(0, r * r - x * x - y * y)), 0),
      [1, 3]
    )
    const { value } = integrateAperture(spheres, Number.POSITIVE_INFINITY, 1e-3, true)
    expect(value[EMITTED] / ((4 / 3) * Math.PI * (1 + 27))).toBeCloseTo(1, 3)
  })

  it('cuts at the aperture and needs no mirror for a lopsided field', () => {
    const lopsided = fieldOf((x, y) => Math.exp(-((x - 0.4) ** 2) - (y - 0.2) ** 2), [0.1, 0.5, 1, 2, 4])
    // Gaussian of unit width centred off the origin, in the disk of radius 4 but for 1e-6 of it.
    const all = integrateAperture(lopsided, 4, 1e-4, false).value[EMITTED]
    expect(Math.abs(all / Math.PI - 1)).toBeLessThan(3e-4)
    const uniform = fieldOf(() => 2, [0.1, 1, 10])
    expect(integrateAperture(uniform, 3, 1e-4, false).value[EMITTED] / (2 * Math.PI * 9)).toBeCloseTo(1, 10)
  })
})
