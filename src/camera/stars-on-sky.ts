import { isFromPlace } from '../scene/is-from-place.js'
import type { CameraSpec, Scene, StarSpec } from '../scene/types.js'
import type { StarOnSky } from './types.js'
import { viewBasis } from './view.js'

/** The stars of a scene where a camera sees them, with no flux yet. */
export function starsOnSky({ sources, distance }: Scene, { view, wavelengths }: CameraSpec): StarOnSky[] {
  const stars = sources.filter((source): source is StarSpec => source.kind === 'star')
  return stars.map(({ name, at, extent, radius, limbDarkening }) => {
    const { east, north, away } = isFromPlace(view) ? seenFromPlace(at, view.from) : seenFromAfar(at, viewBasis(view), distance)
    return {
      name,
      east,
      north,
      radius: extent === 'sphere' ? Math.asin(Math.min(1, radius! / away)) : 0,
      limbDarkening,
      flux: new Float64Array(wavelengths.length)
    }
  })
}

function seenFromAfar(at: number[], { right, up }: { right: number[]; up: number[] }, distance: number) {
  const along = (axis: number[]) => axis.reduce((sum, component, i) => sum + component * at[i], 0) / distance
  return { east: 0 - along(right), north: along(up), away: distance }
}

/** Longitude and latitude in the frame of the scene. */
function seenFromPlace(at: number[], from: number[]) {
  const [x, y, z] = at.map((component, i) => component - from[i])
  return { east: Math.atan2(y, x), north: Math.atan2(z, Math.hypot(x, y)), away: Math.hypot(x, y, z) }
}
