import { version } from '../output/version.js'
import type { InputFile } from '../scene/types.js'
import type { Agreed, Compared } from './compare-run.js'
import { type Verdict, verdictOf } from './verdict.js'

/** The file that makes a folder a comparison. */
export const comparisonRecordName = 'comparison.json'

const MOST_NOISE = 0.25

/** Content of `comparison.json`. */
export interface ComparisonRecord extends Verdict {
  program: 'motelight'
  version: string
  /** `writing` stands only in the record of a comparison whose files were never finished. */
  state: 'writing' | 'done'
  title: string
  data: string
  inputs: InputFile[]
  /** The run that was compared. */
  run: { folder: string; title: string; version: string; seed: string; inputs: InputFile[] }
  warnings: string[]
  /** Relative to the folder. */
  files: string[]
}

export function comparisonRecord(compared: Compared, files: string[]): ComparisonRecord {
  const { run, data } = compared
  const { title, version: runVersion, seed, inputs } = run.record
  const verdict = verdictOf(compared)
  return {
    program: 'motelight',
    version,
    state: 'done',
    title: data.title,
    data: data.file,
    inputs: data.inputs,
    run: { folder: run.path, title, version: runVersion, seed, inputs },
    ...verdict,
    warnings: warningsOf(compared, verdict),
    files
  }
}

function warningsOf({ sets }: Agreed, { sets: findings, scalings }: Verdict): string[] {
  return [
    ...sets.flatMap(({ warnings }) => warnings),
    ...findings
      .filter(({ noiseShare }) => noiseShare > MOST_NOISE)
      .map(
        ({ name, noiseShare }) =>
          `${name}: ${Math.round(100 * noiseShare)} % of the variance is the Monte Carlo noise of the run, which neighbouring values share: its chi-squared scatters more than its degrees of freedom say; a finer run would tell more`
      ),
    ...findings
      .filter(({ degreesOfFreedom }) => !(degreesOfFreedom > 0))
      .map(({ name }) => `${name}: fewer independent values than fitted numbers; its chi-squared tells nothing`),
    ...scalings
      .filter(({ sigma }) => sigma === null)
      .map(({ scaling, sets: of }) => `${scaling} of ${of.join(', ')}: the data do not tell it; its value means nothing`)
  ]
}
