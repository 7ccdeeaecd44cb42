import { existsSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import type { Argv, CommandModule } from 'yargs'
import { type ComparisonRecord, comparisonRecordName } from '../compare/comparison-record.js'
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
  describe: 'Make the page of a finished run, observation or comparison anew (report.html in its folder)',
  builder: (yargs: Argv) =>
    yargs
      .positional('folder', { describe: 'Folder of a run, an observation or a comparison', type: 'string', demandOption: true })
      .options(options) as Argv<Arguments>,
  handler: async ({ folder, json }) => {
    const file = await remake(folder)
    process.stdout.write(json ? `${JSON.stringify({ report: file }, null, 2)}\n` : `The report is ${file}\n`)
  }
}

/** Makes the page anew and returns its path. */
async function remake(folder: string): Promise<string> {
  if (existsSync(join(folder, observationRecordName))) {
    const { observationReport } = await import('../observe/observation-report.js')
    const record = finished<ObservationRecord>(folder, observationRecordName, 'observations', 'an observation')
    return rewriteReport(folder, observationRecordName, record, observationReport(folder, record))
  }
  if (existsSync(join(folder, comparisonRecordName))) {
    const { comparisonReport } = await import('../compare/comparison-report.js')
    const record = finished<ComparisonRecord>(folder, comparisonRecordName, 'sets', 'a comparison')
    return rewriteReport(folder, comparisonRecordName, record, comparisonReport(folder, record))
  }
  const { record } = openRun(folder)
  const { runReport } = await import('../run/run-report.js')
  return rewriteReport(folder, recordName, record, runReport(folder, record))
}

/** The record in a folder, with its list of that key. Throws a DataError where it is not ours or not finished. */
function finished<Content extends ObservationRecord | ComparisonRecord>(
  folder: string,
  name: string,
  list: keyof Content,
  what: string
): Content {
  const text = readFileSync(join(folder, name), 'utf8')
  let record: Content | undefined
  try {
    record = JSON.parse(text) as Content
  } catch {
    // Told below, as any other content that is not ours.
  }
  if (record?.program !== 'motelight' || !Array.isArray(record.files) || !Array.isArray(record[list]))
    throw new DataError(folder, `holds an unsound ${name}`)
  if (record.state === 'writing') throw new DataError(folder, `holds ${what} whose files were never finished; make it again`)
  return record
}
