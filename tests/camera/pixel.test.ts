import { describe, expect, it } from 'vitest'
import { PixelIntegrator } from '../../src/camera/pixel.js'
import { EMITTED } from '../../src/camera/ray-values.js'
import { fieldOf, rim } from './fields.js'

/** Sum over a picture of n x n pixels that covers the square of half width `half`. */
function sumOfPicture(integrator: PixelIntegrator, n: number, half: number): number {
  const size = (2 * half) / n
  let sum = 0
  for (let j = 0; j < n; j++) {
    for (let i = 0; i < n; i++) {
      integrator.integrate((i + 0.5) * size - half, (j + 0.5) * size - half, size, size)
      sum += integrator.mean[EMITTED] * size * size
    }
  }
  return sum
}

describe('PixelIntegrator', () => {
  it.each([1, 2, 3, 8, 31, 64])('keeps the flux of a rim smaller than a pixel in a picture of %i pixels a side', (n) => {
    const sum = sumOfPicture(new PixelIntegrator(rim.field, 1e-3, 1e-6), n, 100)
    expect(Math.abs(sum / rim.integral - 1)).toBeLessThan(2e-3)
  })

  it('gives the mean of a smooth field over a pixel', () => {
    const field = fieldOf((x, y) => Math.exp(-(x * x + y * y) / 200), [1, 50])
    const integrator = new PixelIntegrator(field, 1e-4, 0)
    integrator.integrate(12, -7, 2, 2)
    let sum = 0
    for (let j = 0; j < 200; j++) {
      for (let i = 0; i < 200; i++) sum += Math.exp(-((11 + (i + 0.5) / 100) ** 2 + (-8 + (j + 0.5) / 100) ** 2) / 200)
    }
    expect(integrator.mean[EMITTED] / (sum / 40_000)).toBeCloseTo(1, 3)
  })

  it('sees a dark lane that hides all five rays of a pixel', () => {
    const lane = (y: number) => -Math.expm1(-((y / 0.35) ** 8))
    const field = fieldOf((_, y) => lane(y), [1, 100])
    const integrator = new PixelIntegrator(field, 1e-3, 0)
    integrator.integrate(20, 0, 1, 1)
    let sum = 0
    for (let j = 0; j < 1000; j++) sum += lane((j + 0.5) / 1000 - 0.5) / 1000
    expect(Math.abs(integrator.mean[EMITTED] / sum - 1)).toBeLessThan(0.02)
  })
})
