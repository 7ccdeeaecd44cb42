import { isFromPlace } from './is-from-place.js'
import type { Scene, ScenePath } from './types.js'

/** What stands against cameras at places of a scene: a star is there. */
export function placeProblems({ cameras, sources }: Scene): { path: ScenePath; problem: string }[] {
  return cameras.flatMap(({ view }, i) => {
    if (!isFromPlace(view)) return []
    const within = sources.find(
      (source) =>
        source.kind === 'star' &&
        Math.hypot(...source.at.map((component, a) => component - view.from[a])) <=
          (source.extent === 'sphere' ? source.radius! : 0)
    )
    if (!within) return []
    return [
      {
        path: ['cameras', i, 'view', 'from'],
        problem: `source ${within.name} is there; a place outside of all stars is expected`
      }
    ]
  })
}
