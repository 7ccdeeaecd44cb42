import { resolve } from 'node:path'
import { comparedSets, refusing } from '../../compare/compare-run.js'
import { parseData } from '../../compare/read-data.js'
import { textsOf, wavelengthsIn } from '../../compare/sets/columns.js'
import type { PhotometryData } from '../../compare/types.js'
import type { Refuse } from '../../observe/observe-run.js'
import { isRecord } from '../../scene/is-record.js'
import type { Scene } from '../../scene/types.js'
import { YamlDocument } from '../../scene/yaml-document.js'
import { formatQuantity } from '../../units/quantity.js'
import { darkLight } from '../data/model-lights.js'
import { dataSpectrumName, fingerprintOf, forModels } from '../data/sources.js'
import type { DataSpectrum, SweepData } from '../types.js'
import { readNamed } from './read-named.js'

/** The data of a plan. */
export interface PlanData {
  data: SweepData
  dataSpectra: DataSpectrum[]
  /** Throws a SceneError where models of a scene cannot be compared with the data. */
  check: (scene: Scene) => void
}

/**
 * Reads what a plan has under `data`: a file of data, or a list of the same entries, those without a kind being measured fluxes. Throws a
 * SceneError that tells where in which file.
 */
export function readPlanData(written: string | unknown[], plan: string, document: YamlDocument, scene: Scene): PlanData {
  const source = typeof written === 'string' ? dataFile(written, plan, document) : dataInPlan(written, plan, document)
  const list = parseData(source.value, source.document, source.file)
  const dataSpectra = list.sets.flatMap((set, i) =>
    set.kind === 'photometry' ? [refusing(list, i, (refuse) => spectrumFor(set, scene, refuse))] : []
  )
  const { free, data } = source.value as SweepData['content']
  const content = { ...(free && { free }), data }
  return {
    data: {
      file: resolve(source.file),
      content,
      fingerprint: fingerprintOf(list, content),
      needsImages: list.sets.some(({ kind }) => kind !== 'photometry')
    },
    dataSpectra,
    check: (model) => {
      comparedSets(darkLight(model), forModels(list))
    }
  }
}

function dataFile(name: string, plan: string, document: YamlDocument) {
  const { file, text } = readNamed(name, 'file of data', ['data'], plan, document)
  const own = new YamlDocument(text, file)
  return { file, document: own, value: own.value }
}

function dataInPlan(entries: unknown[], plan: string, document: YamlDocument) {
  const data = entries.map((entry) => (isRecord(entry) && !('kind' in entry) ? { kind: 'photometry', ...entry } : entry))
  return { file: plan, document, value: { data } }
}

/** The wavelengths of the rows, and those of the spectrum itself for rows that are seen through bands. */
function spectrumFor({ name, spectrum, table, bands }: PhotometryData, scene: Scene, refuse: Refuse): DataSpectrum {
  const known = scene.spectra.map((one) => one.name)
  const like = scene.spectra.find((one) => one.name === spectrum)
  if (!like) return refuse('spectrum', `the scene has no such spectrum; there are: ${known.join(', ') || 'none'}`)
  const own = dataSpectrumName(name)
  if (known.includes(own)) refuse('name', `the scene has a spectrum ${own} already`)
  const names = textsOf(table, 'name')
  const ofRows = wavelengthsIn(table, refuse).filter((_, row) => !bands.has(names?.[row] ?? ''))
  const all = [...ofRows, ...(bands.size > 0 ? like.wavelengths : [])].sort((a, b) => a - b)
  return { name: own, like: spectrum, wavelengths: [...new Set(all.map((value) => formatQuantity(value, 'wavelength')))] }
}
