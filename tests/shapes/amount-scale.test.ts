import { describe, expect, it } from 'vitest'
import { integrate } from '../../src/math/quadrature.js'
import type { ShapeSpec } from '../../src/scene/types.js'
import { AmountError, amountScale } from '../../src/shapes/amount-scale.js'
import { makeShape } from '../../src/shapes/make-shape.js'
import { AU } from '../../src/units/constants.js'

const specs: ShapeSpec[] = [
  { kind: 'shell', inner: 5 * AU, outer: 400 * AU, slope: -1.5 },
  { kind: 'ball', radius: 50 * AU, at: [0, 0, 0] },
  { kind: 'disk', inner: 5 * AU, outer: 200 * AU, surfaceSlope: -1, scaleHeight: { value: 8 * AU, at: 100 * AU, flaring: 1.1 } },
  {
    kind: 'disk',
    inner: 5 * AU,
    outer: 600 * AU,
    surfaceSlope: -1,
    taper: 60 * AU,
    scaleHeight: { value: 8 * AU, at: 100 * AU, flaring: 1.1 }
  }
]
/** A power law: 100 cm2/g at 1 um, falling as 1/wavelength. */
const opacity = (wavelength: number) => 100 * (1e-4 / wavelength)

describe.each(specs)('amountScale of a $kind', (spec) => {
  const shape = makeShape(spec)

  it('gives the optical depth asked for along the defining line, integrated numerically', () => {
    const scale = amountScale(shape, { kind: 'optical-depth', opticalDepth: 7, at: 2e-4 }, opacity)
    const along = (u: number) => scale * shape.relativeDensity(Math.exp(u), 0, 0) * Math.exp(u)
    const from = Math.log(shape.innerRadius > 0 ? shape.innerRadius : 1e-9 * AU)
    const to = Math.log(spec.kind === 'disk' ? spec.outer : shape.outerRadius)
    expect(50 * integrate(along, from, to)).toBeCloseTo(7, 7)
  })

  it('gives the mass asked for', () => {
    expect(amountScale(shape, { kind: 'mass', mass: 3e27 }, opacity) * shape.totalMass).toBeCloseTo(3e27, -15)
  })

  it('gives the midplane density asked for', () => {
    const scale = amountScale(shape, { kind: 'density', density: 2e-18, at: 30 * AU }, opacity)
    expect((scale * shape.relativeDensity(0, 30 * AU, 0)) / 2e-18).toBeCloseTo(1, 12)
  })
})

describe('amountScale', () => {
  it('refuses what fixes no density', () => {
    const wind = makeShape({ kind: 'shell', inner: 0, outer: AU, slope: -2 })
    const steep = makeShape({ kind: 'shell', inner: 0, outer: AU, slope: -3 })
    const ball = makeShape({ kind: 'ball', radius: AU, at: [0, 0, 0] })
    expect(() => amountScale(wind, { kind: 'optical-depth', opticalDepth: 1, at: 1e-4 }, opacity)).toThrow(AmountError)
    expect(amountScale(wind, { kind: 'mass', mass: 1e20 }, opacity)).toBeGreaterThan(0)
    expect(() => amountScale(steep, { kind: 'mass', mass: 1e20 }, opacity)).toThrow(/inner/)
    expect(() => amountScale(ball, { kind: 'optical-depth', opticalDepth: 1, at: 1e-4 }, () => 0)).toThrow(/wavelength/)
    expect(() => amountScale(ball, { kind: 'density', density: 1e-20, at: 2 * AU }, opacity)).toThrow(/radius/)
  })
})
