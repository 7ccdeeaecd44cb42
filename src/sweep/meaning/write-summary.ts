import { join } from 'node:path'
import { writeAtomic } from '../../output/atomic.js'
import { asOutputError } from '../../run/output-error.js'
import type { SweepFolder } from '../folder/sweep-folder.js'
import type { Outcomes } from '../results/sweep-table.js'
import type { Summary } from './summary.js'
import { summaryPage } from './summary-page.js'

/** Names of the files that tell what the data say. */
export const summaryNames = ['summary.html', 'summary.json'] as const

/** Writes a summary as a page and as JSON. Throws OutputError. */
export async function writeSummary({ path, sweep }: SweepFolder, outcomes: Outcomes, summary: Summary): Promise<void> {
  const contents = [await summaryPage(sweep, outcomes, summary), `${JSON.stringify(summary, null, 2)}\n`]
  for (const [i, name] of summaryNames.entries()) {
    const file = join(path, name)
    try {
      await writeAtomic(file, contents[i])
    } catch (error) {
      throw asOutputError(file, error)
    }
  }
}
