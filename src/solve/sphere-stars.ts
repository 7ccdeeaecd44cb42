import type { Model } from '../model/model.js'
import { spheresOf } from '../transport/star-spheres.js'

/** The stars that are spheres, as transport and rays meet them. */
export function sphereStars({ stars }: Pick<Model, 'stars'>): Float64Array {
  return spheresOf(stars.map(({ spec: { at, extent, radius } }) => ({ at, radius: extent === 'sphere' ? radius! : 0 })))
}
