import { expect, it } from 'vitest'
import { stream } from '../../src/math/random.js'
import { directionInOrder } from '../../src/transport/direction.js'

it('directionInOrder turns even numbers into even directions, one beside the other', () => {
  const COUNT = 4096
  const uniform = stream('order')
  const [means, squares] = [
    [0, 0, 0],
    [0, 0, 0]
  ]
  const [out, last] = [new Float64Array(3), new Float64Array(3)]
  let steps = 0
  for (let n = 0; n < COUNT; n++) {
    directionInOrder(out, (n + uniform()) / COUNT, uniform)
    for (let a = 0; a < 3; a++) {
      means[a] += out[a] / COUNT
      squares[a] += (out[a] * out[a]) / COUNT
    }
    if (n > 0) steps += Math.hypot(...out.map((value, a) => value - last[a])) / COUNT
    last.set(out)
  }
  // Drawn freely the means would be off by 1 / sqrt(3 x 4096) = 0.009, the squares by 0.005.
  for (const mean of means) expect(Math.abs(mean)).toBeLessThan(0.001)
  for (const square of squares) expect(Math.abs(square - 1 / 3)).toBeLessThan(0.001)
  // Free directions lie 4/3 apart on average, sqrt(4 pi / 4096) is the side of a share.
  expect(steps).toBeLessThan(3 * Math.sqrt((4 * Math.PI) / COUNT))
})
