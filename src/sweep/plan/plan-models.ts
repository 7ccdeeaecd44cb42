import type { DataFiles } from '../../scene/data-files.js'
import { SceneError, type SceneProblem } from '../../scene/error.js'
import { locateProblem } from '../../scene/issue-problems.js'
import type { ScenePath } from '../../scene/types.js'
import type { YamlDocument } from '../../scene/yaml-document.js'
import type { Design } from './design.js'
import { modelsOfAxes } from './models-of-axes.js'
import { modelsOfTable } from './models-of-table.js'
import type { WrittenPlan } from './plan-schema.js'
import type { PlannedModels } from './planned.js'
import { readTies } from './tied-values.js'

/** The parameters of a plan and what they are in each model. Throws SceneError. */
export function planModels(
  written: WrittenPlan,
  base: Record<string, unknown>,
  seed: string,
  document: YamlDocument,
  files: DataFiles
): PlannedModels {
  const problems: SceneProblem[] = []
  const report = (path: ScenePath, message: string) => {
    problems.push(locateProblem(document, path, message))
  }
  const desk = { base, document, report }
  const { design } = written
  const fromTable = typeof design === 'object' && 'table' in design
  if (fromTable && Object.keys(written.vary).length > 0) report(['vary'], 'the table says what varies; leave `vary` out')
  const varied = fromTable ? modelsOfTable(design.table, files, desk) : modelsOfAxes(written, pointsOf(design), seed, desk)
  const ties = varied ? readTies(written, varied.parameters, desk) : []
  const parameters = [...(varied?.parameters ?? []), ...ties.map(({ parameter }) => parameter)]
  parameters.forEach(({ name, path, role }, i) => {
    const other = parameters.slice(0, i).find((earlier) => overlap(earlier.path, path))
    if (!other) return
    const same = other.path.length === path.length
    const at = role === 'tied' ? ['tied', name] : fromTable ? ['design', 'table'] : ['vary', name]
    report(at, `${name} ${same ? 'is the same value of the scene as' : 'overlaps with'} ${other.name}; a value is set once only`)
  })
  if (!varied || problems.length + files.problems.length > 0) throw new SceneError([...problems, ...files.problems])
  const { locate } = varied
  return {
    design: fromTable ? 'table' : pointsOf(design).kind,
    parameters,
    models: varied.models.map((values) => [...values, ...ties.map(({ of }) => of(values))]),
    locate: (i, ...model) => (i < varied.parameters.length ? locate(i, ...model) : document.locate(['tied', parameters[i].name]))
  }
}

function pointsOf(design: WrittenPlan['design']): Design {
  if (design === 'grid' || 'table' in design) return { kind: 'grid' }
  return 'sobol' in design
    ? { kind: 'sobol', count: design.sobol }
    : { kind: 'latin-hypercube', count: design['latin-hypercube'] }
}

/** Whether one path is the other or lies above it. */
function overlap(a: ScenePath, b: ScenePath): boolean {
  return a.slice(0, b.length).every((step, i) => String(step) === String(b[i]))
}
