import { chiSquareTail } from '../math/chi-square.js'
import { micrometres } from '../run/findings.js'
import { ARCSECOND, DEGREE } from '../units/angles.js'
import type { Agreed } from './compare-run.js'
import { goodness } from './goodness.js'

/** How a model agrees with data: each set, what was fitted, and all together. */
export interface Verdict {
  sets: SetFinding[]
  scalings: ScalingFinding[]
  all: Agreement
}

export interface Agreement {
  chiSquared: number
  degreesOfFreedom: number
  /** Of a larger chi-squared by chance, were the model true; `null` without degrees of freedom. */
  probability: number | null
}

export interface SetFinding extends Agreement {
  name: string
  kind: string
  /** Absent for data at many wavelengths. */
  wavelengthUm?: number
  /** Compared, upper limits among them, and left out by the reason. */
  values: number
  limits: number
  leftOut: Record<string, number>
  /** Values that are independent: fewer where errors are correlated over a beam; chi-squared counts as many. */
  independent: number
  /** Mean share of the Monte Carlo error of the model in the variance. */
  noiseShare: number
  /** -2 ln of the likelihood, but for a constant of the data. */
  deviance: number
}

/** A number that was fitted: a factor, an offset towards east or north, or a turn from north towards east. */
export interface ScalingFinding {
  scaling: 'flux' | 'east' | 'north' | 'rotation'
  unit: '' | 'arcsec' | 'deg'
  /** Data sets that it belongs to. */
  sets: string[]
  value: number
  /** `null` where the data do not tell it. */
  sigma: number | null
}

/** How a model agrees. Upper limits have their part in chi-squared, but are no degrees of freedom. */
export function verdictOf(agreed: Agreed): Verdict {
  const sets = setFindings(agreed)
  const scalings = scalingFindings(agreed)
  const sum = (of: (finding: SetFinding) => number) => sets.reduce((all, finding) => all + of(finding), 0)
  const degrees = sum(({ independent, limits }) => independent - limits) - scalings.length
  const chiSquared = sum((finding) => finding.chiSquared)
  return { sets, scalings, all: agreement(chiSquared, degrees) }
}

function setFindings({ sets, models, parameters }: Agreed): SetFinding[] {
  return sets.map((set, i) => {
    const { spec, data, independent, leftOut, wavelength } = set
    const { chiSquared, deviance, noiseShare } = goodness(set, models[i])
    const limits = data.limit ? Array.from(data.limit).reduce((sum, value) => sum + value, 0) : 0
    const count = data.values.length * independent
    const own = parameters.filter((parameter) => !parameter.shared && parameter.sets.includes(set)).length
    return {
      name: spec.name,
      kind: spec.kind,
      ...(wavelength !== undefined && { wavelengthUm: micrometres(wavelength) }),
      values: data.values.length,
      limits,
      leftOut,
      independent: count,
      noiseShare,
      deviance,
      ...agreement(chiSquared, count - limits - own)
    }
  })
}

function agreement(chiSquared: number, degreesOfFreedom: number): Agreement {
  const probability = degreesOfFreedom > 0 ? chiSquareTail(chiSquared, degreesOfFreedom) : null
  return { chiSquared, degreesOfFreedom, probability }
}

function scalingFindings({ parameters, values, sigma }: Agreed): ScalingFinding[] {
  return parameters.map(({ key, sets }, i) => {
    const [unit, size] =
      key === 'flux' ? ['' as const, 1] : key === 'rotation' ? ['deg' as const, DEGREE] : ['arcsec' as const, ARCSECOND]
    const error = sigma[i] / size
    return {
      scaling: key,
      unit,
      sets: sets.map(({ spec }) => spec.name),
      value: values[i] / size,
      sigma: Number.isFinite(error) ? error : null
    }
  })
}
