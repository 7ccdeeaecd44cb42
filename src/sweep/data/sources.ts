import { createHash } from 'node:crypto'
import { parseData } from '../../compare/read-data.js'
import type { DataList } from '../../compare/types.js'
import { parseInstrument } from '../../observe/read-instrument.js'
import type { Instrument } from '../../observe/types.js'
import type { InputFile } from '../../scene/types.js'
import { YamlDocument } from '../../scene/yaml-document.js'
import type { SweepData, SweepInstrument } from '../types.js'

/** The spectrum that models get for a data set. */
export function dataSpectrumName(set: string): string {
  return `data-${set}`
}

/** Data as models are compared with them: measured fluxes with the spectrum that is made for them. */
export function forModels(list: DataList): DataList {
  const sets = list.sets.map((spec) => (spec.kind === 'photometry' ? { ...spec, spectrum: dataSpectrumName(spec.name) } : spec))
  return { ...list, sets }
}

/** Tells data or an instrument from others, by what is written of them and their files as they were read. */
export function fingerprintOf({ inputs }: { inputs: InputFile[] }, content?: SweepData['content']): string {
  return createHash('sha256')
    .update(JSON.stringify([content, inputs.map(({ sha256 }) => sha256)]))
    .digest('hex')
}

/** The data of a sweep, its files read anew. Throws SceneError; its places are those of a text that no file holds. */
export function dataOf({ file, content }: SweepData): DataList {
  const document = new YamlDocument(JSON.stringify(content), file)
  return forModels(parseData(document.value, document, file))
}

/** The instrument of a sweep, its files read anew, with noise of its own for each model. Throws SceneError. */
export function instrumentOf({ file, text }: SweepInstrument, model: number): Instrument {
  const instrument = parseInstrument(text, file)
  return { ...instrument, seed: `${instrument.seed}/${model}` }
}
