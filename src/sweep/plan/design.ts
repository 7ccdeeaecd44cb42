import { latinHypercube } from '../../math/latin-hypercube.js'
import { stream } from '../../math/random.js'
import { sobolPoints } from '../../math/sobol.js'
import { type Axis, gridValues, valueAt } from './axis.js'
import type { Value } from './value.js'

/** Which points of the space of the axes become models. */
export type Design = { kind: 'grid' } | { kind: 'latin-hypercube' | 'sobol'; count: number }

/** Number of models of a design. */
export function modelCount(design: Design, axes: Axis[]): number {
  if (design.kind !== 'grid') return design.count
  return axes.reduce((product, axis) => product * (axis.kind === 'list' ? axis.values.length : axis.count!), 1)
}

/** The values of every model, one for each axis, in the order of the models. On a grid the last axis changes first. */
export function designValues(design: Design, axes: Axis[], seed: string): Value[][] {
  if (design.kind === 'grid')
    return axes
      .map(gridValues)
      .reduce<Value[][]>((models, values) => models.flatMap((model) => values.map((value) => [...model, value])), [[]])
  const points = design.kind === 'sobol' ? sobolPoints : latinHypercube
  const shares = points(design.count, axes.length, stream(`${seed}/design`))
  return shares.map((point) => point.map((share, i) => valueAt(axes[i], share)))
}
