import { describe, expect, it } from 'vitest'
import { parabolicBlend } from '../../src/math/parabolic-blend.js'

describe('parabolicBlend', () => {
  it('gives parabolas exactly, through uneven points', () => {
    const x = [-2, -1.5, 0, 0.3, 2, 5]
    const parabola = (at: number) => 3 - 2 * at + 0.7 * at ** 2
    const curve = parabolicBlend(x, x.map(parabola))
    for (let at = -2; at <= 5; at += 0.01) expect(curve(at)).toBeCloseTo(parabola(at), 10)
  })

  it('goes through its points, and is smooth at them', () => {
    const x = [0, 1, 2, 4, 5]
    const y = [0, 2, -1, 3, 3]
    const curve = parabolicBlend(x, y)
    x.forEach((at, i) => {
      expect(curve(at)).toBeCloseTo(y[i], 12)
    })
    for (const at of x.slice(1, -1)) {
      const h = 1e-6
      expect((curve(at + h) - curve(at)) / h).toBeCloseTo((curve(at) - curve(at - h)) / h, 4)
    }
  })

  it('two points make a line, one a constant; outside, the nearest value', () => {
    expect(parabolicBlend([1, 3], [2, 6])(2)).toBe(4)
    expect(parabolicBlend([1], [7])(1.5)).toBe(7)
    expect(parabolicBlend([1, 3], [2, 6])(9)).toBe(6)
  })
})
