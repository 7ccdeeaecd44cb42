import type { CameraSpec, Scene, StarSpec } from '../scene/types.js'
import type { StarOnSky } from './types.js'
import { viewBasis } from './view.js'

/** The stars of a scene where a camera sees them, with no flux yet. */
export function starsOnSky({ sources, distance }: Scene, { view, wavelengths }: CameraSpec): StarOnSky[] {
  const { right, up } = viewBasis(view)
  const along = (axis: number[], at: number[]) => axis.reduce((sum, component, i) => sum + component * at[i], 0) / distance
  const stars = sources.filter((source): source is StarSpec => source.kind === 'star')
  return stars.map(({ name, at, extent, radius, limbDarkening }) => ({
    name,
    east: 0 - along(right, at),
    north: along(up, at),
    radius: extent === 'sphere' ? radius! / distance : 0,
    limbDarkening,
    flux: new Float64Array(wavelengths.length)
  }))
}
