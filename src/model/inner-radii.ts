import type { OpacityLaw } from '../dust/opacity-law.js'
import { planckNu } from '../dust/planck.js'
import { blackbodyRange } from '../dust/wavelength-grid.js'
import { integrate } from '../math/quadrature.js'
import { errorAt, type SceneError } from '../scene/error.js'
import type { DustSpec, Scene, ShapeSpec } from '../scene/types.js'
import { starSpectrum } from '../sources/star.js'
import { AU, LIGHT_SPEED } from '../units/constants.js'
import { offCentre } from './off-centre.js'

/** An inner radius that is to be found: where a component reaches a temperature, K. */
export interface SoughtRadius {
  component: number
  temperature: number
  /** Where the radius stands, cm, and the least it can be. */
  radius: number
  least: number
}

/**
 * Every inner radius to be found: those given by a temperature, and those to which dust sublimates. Shapes without an inner radius,
 * clumps, which would move with it, and dust in cubes sublimate cell by cell alone.
 */
export function soughtRadii(scene: Scene): SoughtRadius[] {
  const inCubes = scene.grid.kind === 'octree' || offCentre(scene).length > 0
  return scene.dust.flatMap(({ shape, sublimation, hollow, clumps }, component) => {
    if (!('inner' in shape)) return []
    const { inner, sought } = shape
    if (sought) return [{ component, temperature: sought.temperature, radius: inner, least: 0 }]
    if (sublimation === undefined || clumps || inCubes) return []
    return [{ component, temperature: sublimation, radius: hollow ?? inner, least: inner }]
  })
}

/** The shape of a component with what a run has found to be hollow. */
export function hollowed({ shape, hollow }: DustSpec): ShapeSpec {
  return hollow !== undefined && 'inner' in shape ? { ...shape, inner: hollow } : shape
}

/** A scene whose inner radii to be found have a first guess where they have no value yet. Throws SceneError. */
export function withFirstRadii(scene: Scene, laws: OpacityLaw[]): Scene {
  const unknown = soughtRadii(scene).filter(({ radius }) => Number.isNaN(radius))
  if (unknown.length === 0) return scene
  return withInnerRadii(
    scene,
    unknown.map((sought) => ({ ...sought, radius: thinRadius(scene, laws[sought.component], sought.temperature) }))
  )
}

/** A scene with these inner radii. Throws SceneError for one that lies beyond the outer radius or inside a star. */
export function withInnerRadii(scene: Scene, radii: Pick<SoughtRadius, 'component' | 'radius'>[]): Scene {
  const surface = scene.sources.reduce(
    (most, source) => (source.kind === 'star' && source.extent === 'sphere' ? Math.max(most, source.radius!) : most),
    0
  )
  const dust = [...scene.dust]
  for (const { component, radius } of radii) {
    const spec = dust[component]
    const { shape } = spec
    if (!('inner' in shape)) continue
    const { sought } = shape
    const outer = sought?.timesInner === undefined ? shape.outer : radius * sought.timesInner
    const place = `${Number((radius / AU).toPrecision(3))} au`
    if (!sought) {
      if (!(radius < outer)) throw refusal(scene, component, `all of the dust would sublimate: it is too hot out to ${place}`)
      dust[component] = { ...spec, hollow: radius }
      continue
    }
    const would = `at ${sought.temperature} K it would lie at ${place}`
    if (!(radius < outer))
      throw refusal(scene, component, `${would}, beyond the outer radius; give a length or a higher temperature`)
    if (radius <= surface) throw refusal(scene, component, `${would}, inside a star; give a length or a lower temperature`)
    dust[component] = { ...spec, shape: { ...shape, inner: radius, outer } }
  }
  return { ...scene, dust }
}

/** An error at the temperature that an inner radius follows from. */
export function refusal(scene: Scene, component: number, message: string): SceneError {
  const path = ['dust', component, ...(scene.dust[component].sublimation === undefined ? ['shape', 'inner'] : ['sublimation'])]
  return errorAt(scene, path, message)
}

/** Where dust has its temperature in nothing but the light of the stars: 4 pi int kappa B d(nu) = int kappa L d(nu) / (4 pi r^2). */
function thinRadius({ sources }: Scene, { absorption }: OpacityLaw, temperature: number): number {
  const absorbed = ([shortest, longest]: [number, number], perHz: (nu: number) => number) =>
    integrate(
      (x) => {
        const nu = Math.exp(x)
        return nu * absorption(LIGHT_SPEED / nu) * perHz(nu)
      },
      Math.log(LIGHT_SPEED / longest),
      Math.log(LIGHT_SPEED / shortest),
      1e-4
    )
  const heating = sources.reduce((sum, source) => {
    if (source.kind !== 'star') return sum
    const { range, luminosityNu } = starSpectrum(source)
    return sum + absorbed(range, luminosityNu)
  }, 0)
  const cooling = absorbed(blackbodyRange(temperature), (nu) => planckNu(nu, temperature))
  return Math.sqrt(heating / cooling) / (4 * Math.PI)
}
