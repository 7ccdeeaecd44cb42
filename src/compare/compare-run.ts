import { DataError } from '../data/error.js'
import { absent, type Refuse, weightsFor } from '../observe/observe-run.js'
import { openRun, type RunSource, readCamera, readSpectrum } from '../observe/run-source.js'
import { SceneError } from '../scene/error.js'
import { type Fitted, fitScalings, type Parameter } from './fit.js'
import type { ComparedSet } from './sets/compared-set.js'
import { photometrySet } from './sets/photometry-set.js'
import { pictureSet } from './sets/picture-set.js'
import { profileSet } from './sets/profile-set.js'
import { visibilitySet } from './sets/visibility-set.js'
import type { MeasuredSpec, Measurements, Scaling } from './types.js'

/** What came of comparing a run with data. */
export interface Compared extends Fitted {
  run: RunSource
  data: Measurements
  sets: ComparedSet[]
  parameters: Parameter[]
}

/**
 * Compares a run (its folder) with data, after fitting what the data leave free. Throws a DataError for a run that cannot be used, a
 * SceneError for data that it cannot be compared with.
 */
export function compareRun(path: string, data: Measurements, onProgress: (step: string) => void = () => {}): Compared {
  const run = openRun(path)
  const sets = data.sets.map((spec, i) => {
    onProgress(`${spec.name}: ${i + 1} of ${data.sets.length}`)
    const refuse: Refuse = (key, message) => {
      throw new SceneError([data.problemAt(['data', i, key], message)])
    }
    try {
      const set = setOf(spec, run, refuse)
      for (const scaling of spec.free ?? [])
        if (!set.scalings.includes(scaling))
          refuse('free', `${scaling} cannot be fitted to these data; what can be is ${set.scalings.join(', ')}`)
      return set
    } catch (error) {
      if (error instanceof DataError && 'table' in spec && error.file === spec.table.file) refuse('file', error.message)
      throw error
    }
  })
  const parameters = parametersOf(sets, data)
  if (parameters.length > 0) onProgress(`fitting ${parameters.length} ${parameters.length === 1 ? 'number' : 'numbers'}`)
  return { run, data, sets, parameters, ...fitScalings(sets, parameters) }
}

function setOf(spec: MeasuredSpec, run: RunSource, refuse: Refuse): ComparedSet {
  if (spec.kind === 'photometry') {
    if (!run.spectra.includes(spec.spectrum)) refuse('spectrum', absent('spectrum', run.spectra))
    return photometrySet(spec, readSpectrum(run, spec.spectrum), refuse)
  }
  if (!run.cameras.includes(spec.camera)) refuse('camera', absent('camera', run.cameras))
  const source = readCamera(run, spec.camera)
  const light = weightsFor(spec, source.wavelengths, refuse)
  if (spec.kind === 'picture') return pictureSet(spec, source, light, refuse)
  return spec.kind === 'profile' ? profileSet(spec, source, light, refuse) : visibilitySet(spec, source, light, refuse)
}

/** What is fitted: the own scalings of each set, and the common ones of all others that can have them. */
function parametersOf(sets: ComparedSet[], { free }: Measurements): Parameter[] {
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
