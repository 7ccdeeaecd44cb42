import { isFromPlace } from './is-from-place.js'
import type { Scene, ScenePath } from './types.js'

/** What stands against cameras at places of a scene: a star is there, or dust whose scattering law such cameras do not know. */
export function placeProblems({ cameras, sources, dust, opacities }: Scene): { path: ScenePath; problem: string }[] {
  const others = dust.map(({ opacity }) => opacity).filter((opacity) => !isSimple(opacities[opacity].phase))
  return cameras.flatMap(({ view }, i) => {
    if (!isFromPlace(view)) return []
    const path = ['cameras', i, 'view', 'from']
    const within = sources.find(
      (source) =>
        source.kind === 'star' &&
        Math.hypot(...source.at.map((component, a) => component - view.from[a])) <=
          (source.extent === 'sphere' ? source.radius! : 0)
    )
    return [
      ...(within ? [{ path, problem: `source ${within.name} is there; a place outside of all stars is expected` }] : []),
      ...(others.length > 0
        ? [
            {
              path,
              problem: `cameras at a place of the scene need dust that scatters isotropically or by Henyey-Greenstein's law; opacity ${others[0]} has another \`phase\``
            }
          ]
        : [])
    ]
  })
}

function isSimple(phase: Scene['opacities'][string]['phase']): boolean {
  return phase === 'isotropic' || phase === 'henyey-greenstein'
}
