import type { Scene, ScenePath, StarSpec } from '../scene/types.js'

/** The stars away from the origin, with where they stand in the scene file. */
export function offCentre({ sources }: Scene): { star: StarSpec; path: ScenePath }[] {
  return sources.flatMap((star, i) =>
    star.kind === 'star' && star.at.some((component) => component !== 0) ? [{ star, path: ['sources', i, 'at'] }] : []
  )
}
