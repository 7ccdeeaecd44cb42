import { expect, it } from 'vitest'
import { powerOf } from '../../src/math/power.js'

it.each([-4, -3.5, -2, -1.5, -1, -0.5, 0, 0.5, 1, 2.5, 4, 4.5, -1.2, 0.1])(
  'x to the power of %d is that of the library, from 1e-30 to 1e30',
  (n) => {
    const power = powerOf(n)
    for (let x = 1e-30; x < 1e30; x *= 1.37) expect(Math.abs(power(x) / x ** n - 1)).toBeLessThan(1.2e-15)
  }
)
