import { existsSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import type { Argv, CommandModule } from 'yargs'
import { DataError } from '../data/error.js'
import { type ObservationRecord, observationRecordName } from '../observe/observation-record.js'
import { openRun } from '../observe/run-source.js'
import { recordName } from '../run/run-folder.js'
import { rewriteReport } from '../run/write-folder.js'
import { sceneOptions } from './options.js'

const options = { json: sceneOptions.json, quiet: sceneOptions.quiet }

interface Arguments {
  folder: string
  json: boolean
}

export const report: CommandModule<object, Arguments> = {
  command: 'report <folder>',
  describe: 'Make the page of a finished run or observation anew (report.html in its folder)',
  builder: (yargs: Argv) =>
    yargs
      .positional('folder', { describe: 'Folder of a run or an observation', type: 'string', demandOption: true })
      .options(options) as Argv<Arguments>,
  handler: async ({ folder, json }) => {
    const file = await remake(folder)
    process.stdout.write(json ? `${JSON.stringify({ report: file }, null, 2)}\n` : `The report is ${file}\n`)
  }
}

/** Makes the page anew and returns its path. */
async function remake(folder: string): Promise<string> {
  if (!existsSync(join(folder, observationRecordName))) {
    const { record } = openRun(folder)
    const { runReport } = await import('../run/run-report.js')
    return rewriteReport(folder, recordName, record, runReport(folder, record))
  }
  const { observationReport } = await import('../observe/observation-report.js')
  const record = observationOf(folder)
  return rewriteReport(folder, observationRecordName, record, observationReport(folder, record))
}

function observationOf(folder: string): ObservationRecord {
  const text = readFileSync(join(folder, observationRecordName), 'utf8')
  let record: ObservationRecord | undefined
  try {
    record = JSON.parse(text) as ObservationRecord
  } catch {
    // Told below, as any other content that is not ours.
  }
  if (record?.program !== 'motelight' || !Array.isArray(record.files) || !Array.isArray(record.observations))
    throw new DataError(folder, `holds an unsound ${observationRecordName}`)
  if (record.state === 'writing')
    throw new DataError(folder, 'holds an observation whose files were never finished; observe again')
  return record
}
