import type { CameraSource } from './run-source.js'

/**
 * The Monte Carlo noise of some planes of a run (`of`, weighted) as planes that whatever is linear is done to: its modes, or one plane of
 * 1 sigma for a run that did not keep them, as if all noise were alike, which makes an upper limit of it.
 */
export function noisePlanes({ width, height, sigma, modes }: CameraSource, of: number[], weights: Float64Array): Float64Array[] {
  const pixels = width * height
  const count = modes ? modes.length / sigma.length : 1
  return Array.from({ length: count }, (_, g) => {
    const plane = new Float64Array(pixels)
    for (const k of of) {
      const from = (k * count + g) * pixels
      for (let i = 0; i < pixels; i++) plane[i] += weights[k] * sigma[k * pixels + i] * (modes ? modes[from + i] : 1)
    }
    return plane
  })
}

/** 1 sigma of what the planes of its noise add up to. */
export function sigmaOf(noise: Float64Array[]): Float64Array {
  const variance = new Float64Array(noise[0].length)
  for (const plane of noise) for (let i = 0; i < variance.length; i++) variance[i] += plane[i] ** 2
  return variance.map(Math.sqrt)
}
