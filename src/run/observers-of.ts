import { seenFrom } from '../camera/frame.js'
import { type RayMedium, rayMedium } from '../camera/ray-medium.js'
import type { Model } from '../model/model.js'
import type { Vector } from '../scene/types.js'
import type { DustLight } from '../solve/dust-light.js'
import { placeAmong } from '../solve/near-cells.js'
import { POLAR_NODES, polarDirections, type ScatteredLight } from '../solve/scattered-light.js'
import type { SeenBy } from '../solve/tallied-light.js'
import { nearOffset, type Observers } from '../transport/observers.js'
import type { Wanted } from './wanted.js'

/** The observers of the wanted as the packets take them, what scattered light is made for them, and which of it each one uses. */
export function observersOf(model: Model, wanted: Wanted[]): { observers: Observers; seenBy: SeenBy[]; indices: number[] } {
  const views = wanted.map(({ spec }) => seenFrom(model, spec.view))
  const far = different(views.flatMap((view) => ('from' in view ? [] : [view.observer])))
  const near = different(views.flatMap((view) => ('from' in view ? [view.from] : [])))
  // In cells symmetric about z, an observer far away in every direction knows what is seen from any place.
  const polar = model.dimensions === 2 && near.length > 0
  const indices = views.map((view) => {
    if (!('from' in view)) return indexIn(far, view.observer)
    return far.length + (polar ? 0 : indexIn(near, view.from))
  })
  const single = (_: Vector, first: number): SeenBy => ({ first, polarNodes: 1 })
  if (!polar) {
    const places = near.map((at) => placeAmong(model.walls, model.cells, at))
    const observers = { directions: Float64Array.from(far.flat()), places }
    const atPlaces = places.map(
      ({ near: cells }, i): SeenBy => ({
        first: far.length + i,
        polarNodes: 1,
        near: { cells, offset: nearOffset(model.cells, observers, i) }
      })
    )
    return { observers, seenBy: [...far.map(single), ...atPlaces], indices }
  }
  const directions = Float64Array.from([...far, ...polarDirections()].flat())
  return {
    observers: { directions, places: [] },
    seenBy: [...far.map(single), { first: far.length, polarNodes: POLAR_NODES }],
    indices
  }
}

const indexIn = (vectors: Vector[], vector: Vector) => vectors.findIndex((other) => other.join() === vector.join())

function different(vectors: Vector[]): Vector[] {
  return vectors.filter((vector, i) => indexIn(vectors, vector) === i)
}

/** The light of the dust as the observer of that index sees it. */
export function mediumFor(model: Model, light: DustLight, scattered: ScatteredLight[], index: number): RayMedium {
  return rayMedium(model, light, scattered.length === 0 ? undefined : scattered[model.dimensions === 1 ? 0 : index])
}
