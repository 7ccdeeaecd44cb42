import { chiSquareTail } from '../math/chi-square.js'
import { version } from '../output/version.js'
import { micrometres } from '../run/findings.js'
import type { InputFile } from '../scene/types.js'
import { ARCSECOND, DEGREE } from '../units/angles.js'
import type { Compared } from './compare-run.js'
import { goodness } from './goodness.js'

/** The file that makes a folder a comparison. */
export const comparisonRecordName = 'comparison.json'

const MOST_NOISE = 0.25

/** Content of `comparison.json`. */
export interface ComparisonRecord {
  program: 'motelight'
  version: string
  /** `writing` stands only in the record of a comparison whose files were never finished. */
  state: 'writing' | 'done'
  title: string
  data: string
  inputs: InputFile[]
  /** The run that was compared. */
  run: { folder: string; title: string; version: string; seed: string; inputs: InputFile[] }
  sets: SetFinding[]
  scalings: ScalingFinding[]
  all: Agreement
  warnings: string[]
  /** Relative to the folder. */
  files: string[]
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

export function comparisonRecord(compared: Compared, files: string[]): ComparisonRecord {
  const { run, data } = compared
  const { title, version: runVersion, seed, inputs } = run.record
  const sets = setFindings(compared)
  const scalings = scalingFindings(compared)
  const sum = (of: (finding: SetFinding) => number) => sets.reduce((all, finding) => all + of(finding), 0)
  const degrees = sum(({ independent, limits }) => independent - limits) - scalings.length
  return {
    program: 'motelight',
    version,
    state: 'done',
    title: data.title,
    data: data.file,
    inputs: data.inputs,
    run: { folder: run.path, title, version: runVersion, seed, inputs },
    sets,
    scalings,
    all: agreement(
      sum(({ chiSquared }) => chiSquared),
      degrees
    ),
    warnings: warningsOf(compared, sets, scalings),
    files
  }
}

/** Upper limits have their part in chi-squared, but are no degrees of freedom. */
function setFindings({ sets, models, parameters }: Compared): SetFinding[] {
  return sets.map(({ spec, data, independent, leftOut, wavelength }, i) => {
    const { chiSquared, noiseShare } = goodness(data, models[i])
    const limits = data.limit ? Array.from(data.limit).reduce((sum, value) => sum + value, 0) : 0
    const count = data.values.length * independent
    const own = parameters.filter((parameter) => !parameter.shared && parameter.sets.includes(sets[i])).length
    return {
      name: spec.name,
      kind: spec.kind,
      ...(wavelength !== undefined && { wavelengthUm: micrometres(wavelength) }),
      values: data.values.length,
      limits,
      leftOut,
      independent: count,
      noiseShare,
      ...agreement(chiSquared * independent, count - limits - own)
    }
  })
}

function agreement(chiSquared: number, degreesOfFreedom: number): Agreement {
  const probability = degreesOfFreedom > 0 ? chiSquareTail(chiSquared, degreesOfFreedom) : null
  return { chiSquared, degreesOfFreedom, probability }
}

function scalingFindings({ parameters, values, sigma }: Compared): ScalingFinding[] {
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

function warningsOf({ sets }: Compared, findings: SetFinding[], scalings: ScalingFinding[]): string[] {
  return [
    ...sets.flatMap(({ warnings }) => warnings),
    ...findings
      .filter(({ noiseShare }) => noiseShare > MOST_NOISE)
      .map(
        ({ name, noiseShare }) =>
          `${name}: ${Math.round(100 * noiseShare)} % of the variance is the Monte Carlo noise of the run, whose 1 sigma is an upper limit; its chi-squared may be too small, a finer run would tell more`
      ),
    ...findings
      .filter(({ degreesOfFreedom }) => !(degreesOfFreedom > 0))
      .map(({ name }) => `${name}: fewer independent values than fitted numbers; its chi-squared tells nothing`),
    ...scalings
      .filter(({ sigma }) => sigma === null)
      .map(({ scaling, sets: of }) => `${scaling} of ${of.join(', ')}: the data do not tell it; its value means nothing`)
  ]
}
