import type { DustLayer } from '../grid/dust-layer.js'
import { growOctree } from '../grid/octree/grow-octree.js'
import type { Octree } from '../grid/octree/octree.js'
import { allocateShared } from '../math/allocate.js'
import { errorAt } from '../scene/error.js'
import type { Scene, StarSpec } from '../scene/types.js'
import { refusal, soughtRadii } from './inner-radii.js'
import { offCentre } from './off-centre.js'

/** Why a scene of such symmetry is laid out in cubes; undefined where spherical cells do. Throws SceneError where neither do. */
export function reasonForCubes(scene: Scene, dimensions: 1 | 2 | 3): string | undefined {
  const { kind } = scene.grid
  const [away] = offCentre(scene)
  const [sought] = soughtRadii(scene)
  const cubes = kind === 'octree' || (kind === 'auto' && (away || (dimensions === 3 && !sought)))
  if (kind === 'spherical' && away)
    throw errorAt(scene, away.path, 'spherical cells need every star at the origin; ask for `grid: {kind: octree}`')
  if (cubes && sought)
    throw refusal(scene, sought.component, 'an inner radius that follows from a temperature, in an octree: not available yet')
  if (!cubes) return undefined
  if (kind === 'octree') return 'grid.kind asks for it'
  return away ? `source ${away.star.name} is away from the origin` : 'the scene is not symmetric about z'
}

/** Share of the light of the dust that cubes may get wrong: as much as the precision asked for, or 1 %. */
export function octreeTolerance({ effort }: Scene): number {
  return effort.precision ?? 0.01
}

/** Cubes about the dust and all stars. Throws SceneError for a star outside the width asked for. */
export function layCubes(scene: Scene, layers: DustLayer[]): Octree {
  const { width, finest, cellsAtMost } = scene.grid
  const stars = scene.sources.filter((source): source is StarSpec => source.kind === 'star')
  const needed = (star: StarSpec) => {
    const surface = star.extent === 'sphere' ? star.radius! : 0
    return Math.max(...star.at.map((component) => (component === 0 ? 0 : MARGIN * Math.abs(component)))) + surface
  }
  for (const star of stars) {
    if (width === 0 || needed(star) < 0.5 * width) continue
    throw errorAt(
      scene,
      ['sources', scene.sources.indexOf(star), 'at'],
      'the star lies outside the cube; ask for a larger `grid.width`'
    )
  }
  const half = Math.max(...layers.map(({ shape }) => shape.halfSide ?? shape.outerRadius), ...stars.map(needed))
  const side = width > 0 ? width : 2 * half
  const places = stars.map(({ at }) => at)
  return growOctree(
    { layers, stars: places, width: side, finest, cellsAtMost, tolerance: octreeTolerance(scene) },
    allocateShared
  )
}

/** The cube reaches farther than a star by this factor. */
const MARGIN = 1.01
