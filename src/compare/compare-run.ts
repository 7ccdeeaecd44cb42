import { DataError } from '../data/error.js'
import { absent, cameraNamed, type Refuse, weightsFor } from '../observe/observe-run.js'
import { type ModelLight, openRun, type RunSource } from '../observe/run-source.js'
import { SceneError } from '../scene/error.js'
import { type Fitted, fitScalings, type Parameter } from './fit.js'
import type { ComparedSet } from './sets/compared-set.js'
import { photometrySet } from './sets/photometry-set.js'
import { pictureSet } from './sets/picture-set.js'
import { profileSet } from './sets/profile-set.js'
import { visibilitySet } from './sets/visibility-set.js'
import type { DataList, MeasuredSpec, Measurements, Scaling } from './types.js'

/** What came of comparing a model with data. */
export interface Agreed extends Fitted {
  sets: ComparedSet[]
  parameters: Parameter[]
}

/** The same of a run. */
export interface Compared extends Agreed {
  run: RunSource
  data: Measurements
}

/**
 * Compares a run (its folder) with data, after fitting what the data leave free. Throws a DataError for a run that cannot be used, a
 * SceneError for data that it cannot be compared with.
 */
export function compareRun(path: string, data: Measurements, onProgress: (step: string) => void = () => {}): Compared {
  const run = openRun(path)
  return { run, data, ...compareModel(run, data, onProgress) }
}

/** The same for a model, wherever it is. */
export function compareModel(light: ModelLight, data: DataList, onProgress: (step: string) => void = () => {}): Agreed {
  const sets = comparedSets(light, data, onProgress)
  const parameters = parametersOf(sets, data)
  if (parameters.length > 0) onProgress(`fitting ${parameters.length} ${parameters.length === 1 ? 'number' : 'numbers'}`)
  return { sets, parameters, ...fitScalings(sets, parameters) }
}

/** The data sets with what a model has for each, before anything is fitted. Throws as `compareRun`. */
export function comparedSets(light: ModelLight, data: DataList, onProgress: (step: string) => void = () => {}): ComparedSet[] {
  return data.sets.map((spec, i) => {
    onProgress(`${spec.name}: ${i + 1} of ${data.sets.length}`)
    return refusing(data, i, (refuse) => {
      const set = setOf(spec, light, refuse)
      for (const scaling of spec.free ?? [])
        if (!set.scalings.includes(scaling))
          refuse('free', `${scaling} cannot be fitted to these data; what can be is ${set.scalings.join(', ')}`)
      return set
    })
  })
}

/** Does something with one of the data sets; what is refused, or wrong in its table, is a SceneError at its entry. */
export function refusing<Result>(data: DataList, index: number, work: (refuse: Refuse) => Result): Result {
  const spec = data.sets[index]
  const refuse: Refuse = (key, message) => {
    throw new SceneError([data.problemAt(['data', index, key], message)])
  }
  try {
    return work(refuse)
  } catch (error) {
    if (error instanceof DataError && 'table' in spec && error.file === spec.table.file) refuse('file', error.message)
    throw error
  }
}

function setOf(spec: MeasuredSpec, light: ModelLight, refuse: Refuse): ComparedSet {
  if (spec.kind === 'photometry') {
    if (!light.spectra.includes(spec.spectrum)) refuse('spectrum', absent('spectrum', light.spectra))
    return photometrySet(spec, light.spectrum(spec.spectrum), refuse)
  }
  const source = cameraNamed(spec.camera, light, refuse)
  const weights = weightsFor(spec, source.wavelengths, refuse)
  if (spec.kind === 'picture') return pictureSet(spec, source, weights, refuse)
  return spec.kind === 'profile' ? profileSet(spec, source, weights, refuse) : visibilitySet(spec, source, weights, refuse)
}

/** What is fitted: the own scalings of each set, and the common ones of all others that can have them. */
function parametersOf(sets: ComparedSet[], { free }: DataList): Parameter[] {
  const own = sets.flatMap((set) => (set.spec.free ?? []).flatMap((scaling) => keysOf(scaling, [set], false)))
  const common = free.flatMap((scaling) => {
    const those = sets.filter(({ spec, scalings }) => !spec.free && scalings.includes(scaling))
    return those.length > 0 ? keysOf(scaling, those, true) : []
  })
  return [...common, ...own]
}

function keysOf(scaling: Scaling, sets: ComparedSet[], shared: boolean): Parameter[] {
  const keys = scaling === 'centre' ? (['east', 'north'] as const) : [scaling]
  return keys.map((key) => ({ key, sets, shared }))
}
