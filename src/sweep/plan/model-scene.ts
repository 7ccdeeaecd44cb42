import { parseScene } from '../../scene/read.js'
import type { Scene, ScenePath } from '../../scene/types.js'
import type { Sweep } from '../types.js'
import { inScene } from './value.js'

/** The scene of a model (numbered from 1). Throws SceneError; its places are those of a text that no file holds. */
export function modelScene(
  { base, sceneFile, parameters, models, seed, dataSpectra }: Omit<Sweep, 'data'>,
  model: number
): Scene {
  const scene = structuredClone(base)
  parameters.forEach(({ path, unit }, i) => {
    put(scene, path, inScene(models[model - 1][i], unit))
  })
  scene.seed = `${seed}/${model}`
  if (dataSpectra.length > 0) {
    const spectra = scene.spectra as Record<string, unknown>[]
    const added = dataSpectra.map(({ like, ...own }) => ({ ...spectra.find(({ name }) => name === like), ...own, unit: 'Jy' }))
    scene.spectra = [...spectra, ...added]
  }
  const read = parseScene(JSON.stringify(scene), sceneFile)
  // The first input is a text that no file holds; what it says is kept by the folder of the sweep.
  return { ...read, inputs: read.inputs.slice(1) }
}

/** The value at a path of a scene as written. */
export function valueAtPath(scene: unknown, path: ScenePath): unknown {
  return path.reduce<unknown>((value, step) => (value as Record<string | number, unknown> | undefined)?.[step], scene)
}

function put(scene: Record<string, unknown>, path: ScenePath, value: unknown): void {
  let section = scene as Record<string | number, unknown>
  for (const step of path.slice(0, -1)) {
    section[step] ??= {}
    section = section[step] as Record<string | number, unknown>
  }
  section[path[path.length - 1]] = value
}
