import FFT from 'fft.js'

/**
 * Convolves real planes (`width` x `height`, row after row) with one real kernel, by fast Fourier transforms of planes padded
 * with zeros to more than twice their size: nothing wraps round. `kernel` gives the kernel at whole offsets (to the right, up)
 * smaller than the sides. Two planes at a time travel as the real and imaginary part of one.
 */
export function convolve(
  planes: Float64Array[],
  width: number,
  height: number,
  kernel: (dx: number, dy: number) => number
): Float64Array[] {
  const across = powerOfTwo(2 * width)
  const up = powerOfTwo(2 * height)
  const response = new Float64Array(2 * across * up)
  for (let dy = 1 - height; dy < height; dy++) {
    for (let dx = 1 - width; dx < width; dx++) {
      response[2 * (((dy + up) % up) * across + ((dx + across) % across))] = kernel(dx, dy)
    }
  }
  transform(response, across, up, false)
  const light = new Float64Array(2 * across * up)
  return planes.flatMap((_, p) => {
    if (p % 2 === 1) return []
    const pair = planes.slice(p, p + 2)
    light.fill(0)
    pair.forEach((values, part) => {
      for (let i = 0; i < values.length; i++) light[2 * (Math.floor(i / width) * across + (i % width)) + part] = values[i]
    })
    transform(light, across, up, false)
    multiply(light, response)
    transform(light, across, up, true)
    return pair.map((_, part) =>
      Float64Array.from({ length: width * height }, (_, i) => light[2 * (Math.floor(i / width) * across + (i % width)) + part])
    )
  })
}

/** Complex numbers times others, in place. */
function multiply(light: Float64Array, response: Float64Array): void {
  for (let i = 0; i < light.length; i += 2) {
    const re = light[i] * response[i] - light[i + 1] * response[i + 1]
    light[i + 1] = light[i] * response[i + 1] + light[i + 1] * response[i]
    light[i] = re
  }
}

/** The transform of a plane of complex numbers in place: rows, then columns. */
function transform(plane: Float64Array, width: number, height: number, inverse: boolean): void {
  lines(plane, width, height, 2, 2 * width, inverse)
  lines(plane, height, width, 2 * width, 2, inverse)
}

/** Transforms `count` lines of `length` numbers, `step` apart along a line and `next` from line to line. */
function lines(plane: Float64Array, length: number, count: number, step: number, next: number, inverse: boolean): void {
  const fft = new FFT(length)
  const line = new Float64Array(2 * length)
  const out = new Float64Array(2 * length)
  for (let i = 0; i < count; i++) {
    for (let k = 0, at = i * next; k < length; k++, at += step) {
      line[2 * k] = plane[at]
      line[2 * k + 1] = plane[at + 1]
    }
    if (inverse) fft.inverseTransform(out, line)
    else fft.transform(out, line)
    for (let k = 0, at = i * next; k < length; k++, at += step) {
      plane[at] = out[2 * k]
      plane[at + 1] = out[2 * k + 1]
    }
  }
}

function powerOfTwo(least: number): number {
  let size = 2
  while (size < least) size *= 2
  return size
}
