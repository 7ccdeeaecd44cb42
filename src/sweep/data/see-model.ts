import { compareModel } from '../../compare/compare-run.js'
import { type Verdict, verdictOf } from '../../compare/verdict.js'
import { type ObservationFinding, observationFindings } from '../../observe/observation-record.js'
import { type Observed, observeModel } from '../../observe/observe-run.js'
import type { RunSource } from '../../observe/run-source.js'
import type { Sweep } from '../types.js'
import { dataOf, fingerprintOf, instrumentOf } from './sources.js'

/** What is made of the images and spectra of a model as soon as they are there. */
export interface Seen {
  /** Tells the data and the instrument from others. */
  fingerprint: string
  /** How it agrees with data that need its images. */
  verdict?: Verdict
  /** What the instrument of the plan records. */
  observations?: ObservationFinding[]
}

/** The fingerprint of what is to be made of each model; undefined where its row in the table is enough. */
export function seenAs({ data, instrument }: Pick<Sweep, 'data' | 'instrument'>): string | undefined {
  return together(data?.needsImages ? data.fingerprint : undefined, instrument?.fingerprint)
}

/** Compares and observes a model, with the files of data and instrument as they are now. Throws as `compareRun` and `observeRun` do. */
export function seeModel({ data, instrument }: Sweep, model: number, run: RunSource): { seen: Seen; observed?: Observed } {
  const list = data?.needsImages ? dataOf(data) : undefined
  const tool = instrument && instrumentOf(instrument, model)
  const observed = tool && { run, ...observeModel(run, tool) }
  const seen = {
    fingerprint: together(list && fingerprintOf(list, data?.content), tool && fingerprintOf(tool)) ?? '',
    ...(list && { verdict: verdictOf(compareModel(run, list)) }),
    ...(observed && { observations: observationFindings(observed) })
  }
  return { seen, ...(observed && { observed }) }
}

function together(data?: string, instrument?: string): string | undefined {
  return data || instrument ? `${data ?? ''}/${instrument ?? ''}` : undefined
}
