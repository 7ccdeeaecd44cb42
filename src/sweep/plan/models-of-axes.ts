import { mostSobolDimensions } from '../../math/sobol.js'
import type { Parameter } from '../types.js'
import { type Axis, readAxis } from './axis.js'
import { type Design, designValues, modelCount } from './design.js'
import { mostModels, type WrittenPlan } from './plan-schema.js'
import type { PlanDesk, Varied } from './planned.js'
import { resolvePath } from './scene-path.js'

/** The models that `vary` and `design` describe; undefined when a problem was reported. */
export function modelsOfAxes(
  written: WrittenPlan,
  design: Design,
  seed: string,
  { base, report, document }: PlanDesk
): Varied | undefined {
  const entries = Object.entries(written.vary)
  if (entries.length === 0) report(['vary'], 'nothing varies: give at least one path with its values')
  const read = entries.map(([name, values]): { axis: Axis; parameter: Parameter } | undefined => {
    const path = resolvePath(name, base)
    const axis = readAxis(values)
    if ('problem' in path) report(['vary', name], path.problem)
    if ('problem' in axis) report(['vary', name, ...axis.path], axis.problem)
    else if (axis.kind === 'range' && (axis.count === undefined) === (design.kind === 'grid'))
      report(
        ['vary', name, 'count'],
        design.kind === 'grid'
          ? 'the key `count` is missing; a grid needs it'
          : '`design` says how many models there are; `count` is for a grid'
      )
    if ('problem' in path || 'problem' in axis) return undefined
    const kind = axis.kind === 'list' && typeof axis.values[0] === 'string' ? 'text' : 'number'
    const log = axis.kind === 'range' && axis.log
    return { axis, parameter: { name, path, unit: axis.unit, role: 'varied', kind, log } }
  })
  if (design.kind === 'sobol' && read.length > mostSobolDimensions)
    report(['design', 'sobol'], `at most ${mostSobolDimensions} paths may vary in a Sobol sequence; there are ${read.length}`)
  const sound = read.filter((entry) => entry !== undefined)
  if (sound.length < entries.length || sound.length === 0) return undefined
  const axes = sound.map(({ axis }) => axis)
  const count = modelCount(design, axes)
  if (!(count <= mostModels)) {
    if (Number.isFinite(count)) report(['vary'], `${count} models; at most ${mostModels} are accepted`)
    return undefined
  }
  return {
    parameters: sound.map(({ parameter }) => parameter),
    models: designValues(design, axes, seed),
    locate: (i, model, models) => {
      const { axis, parameter } = sound[i]
      const at = axis.kind === 'list' ? [axis.values.indexOf(models[model - 1][i])] : []
      return document.locate(['vary', parameter.name, ...at])
    }
  }
}
