import { extent } from '../../math/stats.js'
import { SceneError, type SceneProblem } from '../../scene/error.js'
import type { YamlDocument } from '../../scene/yaml-document.js'
import type { Sweep } from '../types.js'
import { modelScene, valueAtPath } from './model-scene.js'
import type { PlannedModels } from './planned.js'
import { inScene } from './value.js'

/** Models read as scenes before anything is run; of more, those at the ends of every parameter and others evenly spread. */
const MOST_READ = 500

/** Problems told. */
const MOST_TOLD = 10

/** Throws a SceneError where the scene refuses what the plan puts into it, with the place in the plan. */
export function checkModels(sweep: Sweep, locate: PlannedModels['locate'], document: YamlDocument): void {
  const problems: SceneProblem[] = []
  const seen = new Set<string>()
  for (const model of modelsToRead(sweep)) {
    if (problems.length >= MOST_TOLD) break
    try {
      modelScene(sweep, model)
    } catch (error) {
      if (!(error instanceof SceneError)) throw error
      for (const problem of error.problems) {
        const found = planProblem(problem, sweep, model, locate, document)
        const { line, column, file } = found.location
        const key = `${file}:${line}:${column}:${found.message}`
        if (!seen.has(key)) problems.push(found)
        seen.add(key)
      }
    }
  }
  if (problems.length > 0) throw new SceneError(problems)
}

function planProblem(
  { key, message }: SceneProblem,
  { base, design, parameters, models }: Sweep,
  model: number,
  locate: PlannedModels['locate'],
  document: YamlDocument
): SceneProblem {
  const values = models[model - 1]
  const index = parameters.findIndex(({ path }) => {
    const own = path.join('.')
    return own === key || own.startsWith(`${key}.`) || key.startsWith(`${own}.`)
  })
  const all = parameters.map(({ name, unit }, i) => `${name} = ${inScene(values[i], unit)}`).join(', ')
  if (index < 0) return { location: document.locate(['scene']), key: '', message: `model ${model} (${all}): ${key}: ${message}` }
  const { name, unit, path, role } = parameters[index]
  const others = parameters.length > 1 ? `, in model ${model} (${all})` : ''
  const place = locate(index, model, models)
  // A key that the base scene has not may be no key at all, or one that excludes others.
  const isNew = valueAtPath(base, path) === undefined && design !== 'table'
  return {
    location: isNew ? document.locate([role === 'tied' ? 'tied' : 'vary', name]) : place,
    key: name,
    given: String(inScene(values[index], unit)),
    message: `${isNew ? 'the base scene has nothing there, and refuses this' : 'the scene refuses this'}: ${message}${others}`
  }
}

function modelsToRead({ models, parameters }: Sweep): number[] {
  if (models.length <= MOST_READ) return models.map((_, i) => i + 1)
  const chosen = new Set<number>()
  parameters.forEach(({ kind }, p) => {
    const values = models.map((values) => values[p])
    if (kind === 'number') {
      const numbers = values as number[]
      const [least, most] = extent(numbers)
      chosen.add(values.indexOf(least) + 1).add(values.indexOf(most) + 1)
    } else for (const value of new Set(values)) chosen.add(values.indexOf(value) + 1)
  })
  const step = models.length / MOST_READ
  for (let i = 0; i < MOST_READ && chosen.size < MOST_READ; i++) chosen.add(1 + Math.floor(i * step))
  return [...chosen].sort((a, b) => a - b)
}
