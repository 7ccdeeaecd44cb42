import { seenFrom } from '../camera/frame.js'
import { type RayMedium, rayMedium } from '../camera/ray-medium.js'
import type { Model } from '../model/model.js'
import type { DustLight } from '../solve/dust-light.js'
import type { ScatteredLight } from '../solve/scattered-light.js'
import type { Wanted } from './wanted.js'

/** The different directions from which the wanted are seen, as the packets take them, and which of them each one uses. */
export function observersOf(model: Model, wanted: Wanted[]): { observers: Float64Array; indices: number[] } {
  const keys: string[] = []
  const vectors: number[] = []
  const indices = wanted.map(({ spec }) => {
    const { observer } = seenFrom(model, spec.view)
    const key = observer.join(' ')
    if (!keys.includes(key)) {
      keys.push(key)
      vectors.push(...observer)
    }
    return keys.indexOf(key)
  })
  return { observers: Float64Array.from(vectors), indices }
}

/** The light of the dust as the observer of that index sees it. */
export function mediumFor(model: Model, light: DustLight, scattered: ScatteredLight[], index: number): RayMedium {
  return rayMedium(model, light, scattered.length === 0 ? undefined : scattered[model.dimensions === 1 ? 0 : index])
}
