import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { recordName } from './run-folder.js'
import type { RunRecord } from './run-record.js'
import { difference, type Identity } from './state/identity.js'

/** The record of a folder that holds the finished run of that identity; undefined for any other. */
export function finishedRecord(path: string, identity: Identity): RunRecord | undefined {
  try {
    const record = JSON.parse(readFileSync(join(path, recordName), 'utf8')) as RunRecord
    return record.state !== 'writing' && difference(record, identity) === undefined ? record : undefined
  } catch {
    return undefined // No record, or none that can be read: nothing finished.
  }
}
