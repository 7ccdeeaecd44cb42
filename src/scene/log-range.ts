/** `count` values evenly spaced in the logarithm, from `from` to `to`, both ends exact. */
export function logRange(from: number, to: number, count: number): number[] {
  const ratio = to / from
  const values = Array.from({ length: count }, (_, i) => from * ratio ** (i / (count - 1)))
  values[count - 1] = to
  return values
}
