import { makeOpacityLaw } from '../dust/opacity-law.js'
import { planckNu } from '../dust/planck.js'
import { blackbodyRange } from '../dust/wavelength-grid.js'
import { integrate } from '../math/quadrature.js'
import { SceneError } from '../scene/error.js'
import type { DustSpec, Scene } from '../scene/types.js'
import { starSpectrum } from '../sources/star.js'
import { AU, LIGHT_SPEED } from '../units/constants.js'

/** Index of every component whose inner radius is to be found. */
export function soughtComponents({ dust }: Scene): number[] {
  return dust.flatMap(({ shape }, i) => (shape.sought ? [i] : []))
}

/** The inner radius of a component, cm; NaN for shapes without one. */
export function innerRadiusOf({ shape }: DustSpec): number {
  return 'inner' in shape ? shape.inner : Number.NaN
}

/** A scene whose inner radii to be found have a first guess where they have no value yet. Throws SceneError. */
export function withFirstRadii(scene: Scene): Scene {
  const unknown = soughtComponents(scene).filter((i) => Number.isNaN(innerRadiusOf(scene.dust[i])))
  if (unknown.length === 0) return scene
  return withInnerRadii(scene, new Map(unknown.map((i) => [i, thinRadius(scene, i)])))
}

/** A scene with these inner radii (cm, by component). Throws SceneError for one that lies beyond the outer radius or inside a star. */
export function withInnerRadii(scene: Scene, radii: Map<number, number>): Scene {
  const surface = scene.sources.reduce(
    (most, source) => (source.kind === 'star' && source.extent === 'sphere' ? Math.max(most, source.radius!) : most),
    0
  )
  const dust = scene.dust.map((spec, i): DustSpec => {
    const inner = radii.get(i)
    const { shape } = spec
    if (inner === undefined || !('inner' in shape)) return spec
    const outer = shape.sought?.timesInner === undefined ? shape.outer : inner * shape.sought.timesInner
    const would = `at ${shape.sought?.temperature} K it would lie at ${Number((inner / AU).toPrecision(3))} au`
    if (!(inner < outer)) throw refusal(scene, i, `${would}, beyond the outer radius; give a length or a higher temperature`)
    if (inner <= surface) throw refusal(scene, i, `${would}, inside a star; give a length or a lower temperature`)
    return { ...spec, shape: { ...shape, inner, outer } }
  })
  return { ...scene, dust }
}

/** An error at the inner radius of a component. */
export function refusal(scene: Scene, component: number, message: string): SceneError {
  const path = ['dust', component, 'shape', 'inner']
  return new SceneError([{ location: scene.locate(path), key: path.join('.'), message }])
}

/** Where dust has its temperature in nothing but the light of the stars: 4 pi int kappa B d(nu) = int kappa L d(nu) / (4 pi r^2). */
function thinRadius({ sources, opacities, dust }: Scene, component: number): number {
  const { absorption } = makeOpacityLaw(opacities[dust[component].opacity])
  const { temperature } = dust[component].shape.sought!
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
