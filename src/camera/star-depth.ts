import { openWalk, reachOf, type Walk } from '../grid/cells.js'
import { gaussLegendre } from '../math/quadrature.js'
import type { DustComponent, Model } from '../model/model.js'
import type { StarSpec } from '../scene/types.js'
import { sphereStars } from '../solve/sphere-stars.js'
import { pathToStar } from '../transport/star-spheres.js'
import type { DepthAt } from './direct.js'
import { Sight, type View } from './sight.js'

/** A star hides another when it is nearer by more than this share of the reach: more than rounding. */
const HIDES = 1e-12
/** Where samples in a cell differ by more than this share of their mean, so many evenly spaced points are taken. */
const CONTRAST = 0.3
const POINTS = 64
/** Three Gauss points of the way through a cell, from -1 to 1, and its ends, just inside, with no weight. */
const PLACES = Float64Array.of(...gaussLegendre(3).nodes, -0.999, 0.999)
const WEIGHTS = Float64Array.of(...gaussLegendre(3).weights.map((weight) => 0.5 * weight), 0, 0)
/** A component of less optical depth than this in a cell is taken as its mean density there. */
const THIN = 3e-4

/**
 * Optical depths from an observer to stars at one wavelength. Light on a single line is not dimmed as cells would have it, which know
 * mean densities alone: cells only say where to look closely at the density of the dust itself. A jump of the density
 * within a cell costs at most 1/128 of the optical depth of the dust there.
 */
export class StarDepths {
  private readonly walk: Walk
  private readonly sight: Sight
  private readonly spheres: Float64Array
  /** Beyond all cells, stars and the observer at a place, cm. */
  private readonly far: number
  /** cm2/g, of each component. */
  private readonly opacities: number[]

  /** `wavelength` in cm. */
  constructor(
    private readonly model: Pick<Model, 'walls' | 'stars' | 'components'>,
    wavelength: number,
    view: View
  ) {
    this.walk = openWalk(model.walls)
    this.sight = new Sight(view, model.walls)
    this.spheres = sphereStars(model)
    const extent = reachOf(model.walls) + ('from' in view ? Math.hypot(...view.from) : 0)
    this.far = this.spheres.reduce((sum, value, i) => sum + (i % 4 < 3 ? Math.abs(value) : Math.sqrt(value)), extent)
    this.opacities = model.components.map(({ law }) => law.absorption(wavelength) + law.scattering(wavelength))
  }

  /**
   * Optical depths from the observer to a star, along rays that pass its centre at an offset across the line of sight: to its surface,
   * or as far as its centre where the ray misses it or it is a point. Infinite where another star stands in front.
   */
  to({ at, extent, radius }: Pick<StarSpec, 'at' | 'extent' | 'radius'>): DepthAt {
    const { walk, sight, spheres, far, opacities } = this
    const { components } = this.model
    const radius2 = extent === 'sphere' ? radius! ** 2 : 0
    return (u, v) => {
      const depth2 = radius2 - u * u - v * v
      const end = sight.lookPast(at, u, v) - (depth2 > 0 ? Math.sqrt(depth2) : 0)
      if (spheres.length > 0) {
        sight.takeFrom(walk, far)
        if (walk.s + pathToStar(walk, spheres) < end - HIDES * far) return Number.POSITIVE_INFINITY
      }
      if (!sight.enter(walk)) return 0
      let depth = 0
      do {
        const start = walk.s
        const step = Math.min(walk.toWall(), end - start)
        for (let c = 0; step > 0 && c < opacities.length; c++) {
          const mean = components[c].density[walk.cell] * step
          depth += opacities[c] * (opacities[c] * mean > THIN ? columnInCell(walk, start, step, components[c]) : mean)
        }
      } while (walk.sWall < end && walk.cross() >= 0)
      return depth
    }
  }
}

/** Column density (g/cm2) of a component on a part of the walk's way that lies in its present cell. */
function columnInCell({ x0, y0, z0, ux, uy, uz, cell }: Walk, start: number, step: number, dust: DustComponent): number {
  const { relativeDensity } = dust.shape
  const half = 0.5 * step
  const middle = start + half
  let [sum, least, most] = [0, Number.POSITIVE_INFINITY, 0]
  for (let k = 0; k < PLACES.length; k++) {
    const s = middle + half * PLACES[k]
    const value = relativeDensity(x0 + s * ux, y0 + s * uy, z0 + s * uz)
    sum += WEIGHTS[k] * value
    if (value < least) least = value
    if (value > most) most = value
  }
  if (most - least > CONTRAST * sum) {
    sum = 0
    for (let k = 0; k < POINTS; k++) {
      const s = start + ((k + 0.5) / POINTS) * step
      sum += relativeDensity(x0 + s * ux, y0 + s * uy, z0 + s * uz) / POINTS
    }
  }
  // Where the dust is infinitely dense at a point, the mean over the cell has to do.
  return step * (Number.isFinite(sum) ? dust.scale * sum : dust.density[cell])
}
