import { expect, test } from 'vitest'
import { convolve } from '../../src/math/convolve.js'
import { stream } from '../../src/math/random.js'
import { askPython, itWith } from '../support/python.js'
import { scipy } from '../support/scipy.js'

const [width, height] = [13, 6]
const random = stream('convolve')
const plane = () => Float64Array.from({ length: width * height }, () => random())
const planes: [Float64Array, Float64Array] = [plane(), plane()]
const kernel = (dx: number, dy: number) => Math.exp(-0.1 * dx * dx - 0.2 * dy * dy + 0.05 * dx * dy) * (1 + 0.3 * dx)

test('convolve sums kernel times light, nothing wraps round', () => {
  const out = convolve(planes, width, height, kernel)
  for (const [p, result] of out.entries()) {
    for (const at of [0, width - 1, 40, width * height - 1]) {
      let sum = 0
      for (let i = 0; i < width * height; i++)
        sum += planes[p][i] * kernel((at % width) - (i % width), Math.floor(at / width) - Math.floor(i / width))
      expect(result[at]).toBeCloseTo(sum, 12)
    }
  }
})

itWith(scipy, 'convolve agrees with scipy.signal', () => {
  const full = Array.from({ length: 2 * height - 1 }, (_, j) =>
    Array.from({ length: 2 * width - 1 }, (_, i) => kernel(i - width + 1, j - height + 1))
  )
  const theirs = askPython<number[]>(
    `import numpy as np
from scipy.signal import convolve2d
image = np.array(data['image']).reshape(data['height'], data['width'])
answer = convolve2d(image, np.array(data['kernel']))[data['height']-1:2*data['height']-1, data['width']-1:2*data['width']-1].ravel().tolist()`,
    { image: [...planes[0]], kernel: full, width, height }
  )
  convolve(planes, width, height, kernel)[0].forEach((value, i) => {
    expect(value).toBeCloseTo(theirs[i], 10)
  })
})
