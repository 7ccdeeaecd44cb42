import { gaussWeights, kronrodNodes, kronrodWeights } from './kronrod.js'

export interface VectorIntegral {
  values: Float64Array
  /** Largest estimated error among the judged values, relative to their scales. */
  error: number
  /** Calls of the integrand. */
  evaluations: number
}

interface Panel {
  from: number
  to: number
  values: Float64Array
  errors: Float64Array
}

export interface VectorIntegrand {
  /** How many functions. */
  length: number
  /** How many of them, from the first, must converge. */
  judged: number
  /** Puts the values at x into `values`. */
  write: (x: number, values: Float64Array) => void
  /** Turns the summed magnitudes of the judged integrals into the scales that their errors are relative to. */
  setScales: (magnitudes: Float64Array) => void
}

/**
 * Integrals of several functions of one variable from a to b > a, evaluated together. Panels, at first `panels` equal ones, are split
 * where they matter until the estimated error of each judged integral is below `tolerance` of its scale, or `most` evaluations are
 * spent. Gauss-Kronrod rules of 7 and 15 points; their difference overstates the error, so what is reached is much better where the
 * functions are smooth.
 */
export function integrateVector(
  { length, judged, write, setScales }: VectorIntegrand,
  [a, b]: [number, number],
  panels: number,
  tolerance: number,
  most: number
): VectorIntegral {
  const sample = new Float64Array(length)
  const gauss = new Float64Array(judged)
  const evaluate = (from: number, to: number): Panel => {
    const values = new Float64Array(length)
    const half = 0.5 * (to - from)
    gauss.fill(0)
    kronrodNodes.forEach((node, i) => {
      write(from + half * (1 + node), sample)
      const weight = half * kronrodWeights[i]
      for (let q = 0; q < length; q++) values[q] += weight * sample[q]
      const gaussWeight = half * gaussWeights[i]
      if (gaussWeight > 0) for (let q = 0; q < judged; q++) gauss[q] += gaussWeight * sample[q]
    })
    return { from, to, values, errors: gauss.map((value, q) => Math.abs(value - values[q])) }
  }

  const edge = (i: number) => a + ((b - a) * i) / panels
  let list = Array.from({ length: panels }, (_, i) => evaluate(edge(i), edge(i + 1)))
  let evaluations = panels * kronrodNodes.length
  const scale = new Float64Array(judged)
  const summed = new Float64Array(judged)
  for (;;) {
    scale.fill(0)
    summed.fill(0)
    for (const { values, errors } of list) {
      for (let q = 0; q < judged; q++) {
        scale[q] += Math.abs(values[q])
        summed[q] += errors[q]
      }
    }
    setScales(scale)
    const error = summed.reduce((worst, value, q) => Math.max(worst, value > 0 ? value / scale[q] : 0), 0)
    const shares = list.map(({ errors }) =>
      errors.reduce((worst, value, q) => (summed[q] > tolerance * scale[q] ? Math.max(worst, value / scale[q]) : worst), 0)
    )
    const bar = Math.max(tolerance / list.length, 0.1 * Math.max(...shares))
    if (error <= tolerance || evaluations >= most) {
      const values = new Float64Array(length)
      for (const panel of list) for (let q = 0; q < length; q++) values[q] += panel.values[q]
      return { values, error, evaluations }
    }
    list = list.flatMap((panel, i) => {
      if (shares[i] < bar) return panel
      const middle = 0.5 * (panel.from + panel.to)
      evaluations += 2 * kronrodNodes.length
      return [evaluate(panel.from, middle), evaluate(middle, panel.to)]
    })
  }
}
