/** The slope of log y against log x by least squares: y ~ x^slope. */
export function slopeOf(x: number[], y: number[]): number {
  const lx = x.map(Math.log)
  const ly = y.map(Math.log)
  const mx = lx.reduce((sum, value) => sum + value, 0) / x.length
  const my = ly.reduce((sum, value) => sum + value, 0) / y.length
  const top = lx.reduce((sum, value, i) => sum + (value - mx) * (ly[i] - my), 0)
  return top / lx.reduce((sum, value) => sum + (value - mx) ** 2, 0)
}
