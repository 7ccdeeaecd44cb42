import type { FileHandle } from 'node:fs/promises'
import { join } from 'node:path'
import { writeFileAtomic } from '../../output/atomic.js'
import { ecsvPieces } from '../../output/ecsv.js'
import { parquet } from '../../output/parquet.js'
import { asOutputError } from '../../run/output-error.js'
import type { SweepFolder } from '../folder/sweep-folder.js'
import type { Judged } from './outcomes.js'
import { sweepTable } from './sweep-table.js'

/** Names of the tables in the folder of a sweep. */
export const tableNames = ['models.parquet', 'models.ecsv'] as const

/** Writes what is known of all models as Parquet and ECSV. Throws OutputError. */
export async function writeTables({ path, sweep }: SweepFolder, outcomes: Judged): Promise<void> {
  const columns = sweepTable(sweep, outcomes)
  const meta = { origin: `motelight ${sweep.version}`, title: sweep.title }
  await write(tableNames[0], (file) => file.writeFile(parquet(columns, meta)))
  await write(tableNames[1], async (file) => {
    for (const piece of ecsvPieces(columns, meta)) await file.writeFile(piece)
  })

  async function write(name: string, fill: (file: FileHandle) => Promise<void>): Promise<void> {
    const file = join(path, name)
    try {
      await writeFileAtomic(file, fill)
    } catch (error) {
      throw asOutputError(file, error)
    }
  }
}
