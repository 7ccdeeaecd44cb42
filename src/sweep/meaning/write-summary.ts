import { join } from 'node:path'
import { writeOutput } from '../../run/output-error.js'
import type { SweepFolder } from '../folder/sweep-folder.js'
import type { Outcomes } from '../results/outcomes.js'
import { compareBest } from './best-model.js'
import type { Summary } from './summary.js'
import { summaryPage } from './summary-page.js'

/** Names of the files that tell what the data say. */
export const summaryNames = ['summary.html', 'summary.json'] as const

/** Writes a summary as a page and as JSON, and the best model with the data. Throws OutputError. */
export async function writeSummary(
  folder: SweepFolder,
  outcomes: Outcomes,
  summary: Summary,
  onProgress: (step: string) => void = () => {}
): Promise<void> {
  const { path, sweep } = folder
  const [{ model }] = summary.best
  onProgress(`comparing model ${model} with the data`)
  const plots = await compareBest(folder, outcomes, model)
  onProgress('drawing likelihoods')
  const contents = [await summaryPage(sweep, summary, plots), `${JSON.stringify(summary, null, 2)}\n`]
  for (const [i, name] of summaryNames.entries()) await writeOutput(join(path, name), contents[i])
}
