/**
 * Cosine of an azimuth drawn evenly by u: -cos(pi u) = sin(pi (u - 1/2)), by a polynomial fitted at Chebyshev points, to 3e-11 (the
 * step of u is 2e-10). Inline in a loop, where Math.cos is a call.
 */
export function cosAzimuth(u: number): number {
  const w = u - 0.5
  const x = w * w
  const x2 = x * x
  const low = 3.14159265353629 - x * 5.167712764624471
  const middle = 2.5501633189452115 - x * 0.5992521978037336
  const high = 0.08205040171614679 - x * 0.007028386258010294
  return w * (low + x2 * (middle + x2 * high))
}
