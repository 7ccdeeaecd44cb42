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

  it('tells how wrong it is about edges aslant, pixel by pixel', () => {
    // Stripes a third of a pixel wide, 2 % apart in light: steps smaller than what makes it divide.
    const stripes = (x: number, y: number) => 1 + 0.02 * ((Math.sin(12.9898 * Math.floor(2.6 * x + 1.1 * y)) * 43758.5453) % 1)
    const integrator = new PixelIntegrator(
      fieldOf((x, y) => stripes(x, y), [1, 1000]),
      1e-2,
      0
    )
    const pulls = Array.from({ length: 400 }, (_, p) => {
      const [left, low] = [50 + (p % 20), 50 + Math.floor(p / 20)]
      integrator.integrate(left + 0.5, low + 0.5, 1, 1)
      let sum = 0
      for (let i = 0; i < 60; i++) for (let j = 0; j < 60; j++) sum += stripes(left + (i + 0.5) / 60, low + (j + 0.5) / 60)
      return Math.abs(integrator.mean[EMITTED] - sum / 3600) / integrator.error
    })
    const within = (sigmas: number) => pulls.filter((pull) => !(pull > sigmas)).length / pulls.length
    expect(within(1)).toBeGreaterThan(0.68)
    // The error is known from two numbers alone, so its tail is longer than that of a Gaussian.
    expect(within(3)).toBeGreaterThan(0.92)
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
