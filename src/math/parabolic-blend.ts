/**
 * A smooth curve through points of increasing `x`: between two of them the blend of the parabolas through them and either
 * neighbour (Overhauser 1968). Parabolas come out exactly; two points give a line, one a constant. Outside, the nearest value.
 */
export function parabolicBlend(x: number[], y: number[]): (at: number) => number {
  const last = x.length - 1
  return (at) => {
    if (at <= x[0]) return y[0]
    if (at >= x[last]) return y[last]
    let i = 0
    while (at > x[i + 1]) i++
    const share = (at - x[i]) / (x[i + 1] - x[i])
    const line = y[i] + share * (y[i + 1] - y[i])
    const before = i > 0 ? curvature(i - 1) : undefined
    const after = i + 2 <= last ? curvature(i) : undefined
    const left = before ?? after ?? 0
    const right = after ?? before ?? 0
    return line + (left * (1 - share) + right * share) * (at - x[i]) * (at - x[i + 1])
  }

  /** Second divided difference of points k to k + 2. */
  function curvature(k: number): number {
    const slope = (j: number) => (y[j + 1] - y[j]) / (x[j + 1] - x[j])
    return (slope(k + 1) - slope(k)) / (x[k + 2] - x[k])
  }
}
