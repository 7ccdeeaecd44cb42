import { expect, it } from 'vitest'
import { Kernel } from '../../src/kernels/kernel.js'

it('arrays laid in the memory of a kernel stay what they are while it grows', () => {
  const kernel = new Kernel<object>('flights')
  const before = kernel.exports.memory.buffer.byteLength
  const first = kernel.lay([1, 2, 3])
  const whole = kernel.lay([7, 8], Int32Array)
  const long = kernel.lay(new Float64Array(before / 8).fill(5))
  const last = kernel.lay([4])
  expect(kernel.exports.memory.buffer.byteLength).toBeGreaterThan(before)
  expect([...kernel.doubles(first, 3)]).toEqual([1, 2, 3])
  expect([...new Int32Array(kernel.exports.memory.buffer, whole, 2)]).toEqual([7, 8])
  expect(kernel.doubles(long, before / 8).every((value) => value === 5)).toBe(true)
  expect([...kernel.doubles(last, 1)]).toEqual([4])
  kernel.clear()
  expect(kernel.lay([9])).toBe(first)
})
