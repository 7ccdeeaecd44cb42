import { GROUPS } from '../solve/groups.js'
import type { PolarisedPart } from '../solve/scattered-light.js'
import { FIRST_GROUP, Q, RAY_VALUES, SCATTERED } from './ray-values.js'

/** Adds scattered light with its noise to the numbers of a ray. */
export class LightSum {
  constructor(
    private readonly value: Float64Array,
    private readonly groups: Float32Array,
    private readonly polarised: PolarisedPart | undefined
  ) {}

  /** Adds `weight` times the emission coefficient at `index`, `even` times its Q, and `odd` times U and V. */
  add(index: number, weight: number, even: number, odd: number, out: Float64Array, withGroups: boolean): void {
    const { value, groups, polarised } = this
    out[SCATTERED] += weight * value[index]
    if (withGroups) {
      const at = index * GROUPS
      for (let g = 0; g < GROUPS; g++) out[FIRST_GROUP + g] += weight * groups[at + g]
    }
    if (polarised) addPolarised(polarised, index, even, odd, out, withGroups)
  }

  /** Adds as many times the emission coefficients at `index` and the next two, without polarisation: at one go, as most rays want it. */
  addThree(index: number, a: number, b: number, c: number, out: Float64Array, withGroups: boolean): void {
    const { value, groups } = this
    out[SCATTERED] += a * value[index] + b * value[index + 1] + c * value[index + 2]
    if (!withGroups) return
    const at = index * GROUPS
    for (let g = 0; g < GROUPS; g++)
      out[FIRST_GROUP + g] += a * groups[at + g] + b * groups[at + GROUPS + g] + c * groups[at + 2 * GROUPS + g]
  }
}

function addPolarised(
  { parts, value, groups }: PolarisedPart,
  index: number,
  even: number,
  odd: number,
  out: Float64Array,
  withGroups: boolean
): void {
  for (let part = 0; part < parts; part++) {
    const at = index * parts + part
    const amount = part === 0 ? even : odd
    out[Q + part] += amount * value[at]
    if (!withGroups) continue
    const to = RAY_VALUES + part * GROUPS
    for (let g = 0; g < GROUPS; g++) out[to + g] += amount * groups[at * GROUPS + g]
  }
}
