import type { Parameter } from '../types.js'
import { valueAtPath } from './model-scene.js'
import type { WrittenPlan } from './plan-schema.js'
import type { PlanDesk } from './planned.js'
import { resolvePath } from './scene-path.js'
import { numberWithUnit, tidy, type Value } from './value.js'

/** A value that follows one that varies. */
export interface Tie {
  parameter: Parameter
  /** From the varied values of a model. */
  of: (values: Value[]) => number
}

/** The entries of `tied`, those without a problem. */
export function readTies({ tied }: WrittenPlan, varied: Parameter[], { base, report }: PlanDesk): Tie[] {
  return Object.entries(tied).flatMap(([name, { to, times, power = 1 }]): Tie[] => {
    const refuse = (problem: string, ...key: string[]) => {
      report(['tied', name, ...key], problem)
      return []
    }
    const path = resolvePath(name, base)
    if ('problem' in path) return refuse(path.problem)
    const index = varied.findIndex((parameter) => parameter.name === to && parameter.kind === 'number')
    if (index < 0) {
      const numbers = varied.filter(({ kind }) => kind === 'number').map((parameter) => parameter.name)
      return refuse(`not a number that varies; there are: ${numbers.join(', ') || 'none'}`, 'to')
    }
    const lead = varied[index]
    const tie = (unit: string, of: (leading: number) => number): Tie[] => [
      {
        parameter: { name, path, unit, role: 'tied', kind: 'number', log: false },
        of: (values) => tidy(of(Number(values[index])))
      }
    ]
    if (times !== undefined) return tie(lead.unit, (leading) => times * leading)
    const [own, reference] = [path, lead.path].map((place) => numberWithUnit(valueAtPath(base, place)))
    if (!own || !reference) return refuse('without `times`, both values must stand as numbers in the base scene')
    if (reference.unit !== lead.unit)
      return refuse(
        `\`${to}\` must have the same unit in the base scene (${reference.unit || 'none'}) and here (${lead.unit || 'none'})`
      )
    if (!(reference.number > 0)) return refuse(`\`${to}\` must be above 0 in the base scene`)
    return tie(own.unit, (leading) => own.number * (leading / reference.number) ** power)
  })
}
