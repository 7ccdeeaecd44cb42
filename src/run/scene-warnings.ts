import { isOctree } from '../grid/cells.js'
import { integrate } from '../math/quadrature.js'
import { octreeTolerance } from '../model/lay-cubes.js'
import type { DustComponent, Model } from '../model/model.js'
import { mattering, observedWavelengths } from '../model/wavelengths.js'
import { wavelengthLabel } from '../output/wavelength-label.js'
import { isFromPlace } from '../scene/is-from-place.js'
import type { StarSpectrum } from '../sources/star.js'
import { AU, LIGHT_SPEED } from '../units/constants.js'
import { grainWarnings } from './grain-warnings.js'
import { percent } from './percent.js'
import { scatteringWarnings } from './scattering-warnings.js'

/** Optical depth of the first dusty cell above which the temperature at the inner edge is blurred. */
const RESOLVED = 0.3
/** Share of a star's light beyond the end of an opacity table that is worth a word. */
const BEYOND = 0.01

/** What a scene and its cells make doubtful before anything is run. */
export function sceneWarnings(model: Model): string[] {
  return [
    ...model.warnings,
    ...unresolvedEdge(model),
    ...crowded(model),
    ...starInDust(model),
    ...fields(model),
    ...extrapolated(model),
    ...grainWarnings(model),
    ...scatteringWarnings(model)
  ]
}

function unresolvedEdge(model: Model): string[] {
  const { walls, components, stars, scene } = model
  if (stars.length === 0) return []
  if (isOctree(walls)) return []
  const columns = (walls.cosTheta.length - 1) * (walls.phi.length - 1)
  let [most, at] = [0, 0]
  for (const wavelength of mattering(scene, stars, [])) {
    for (let column = 0; column < columns; column++) {
      for (let ir = 0; ir < walls.r.length - 1; ir++) {
        const cell = ir === 0 ? 0 : 1 + (ir - 1) * columns + column
        const depth = (walls.r[ir + 1] - walls.r[ir]) * extinction(components, cell, wavelength)
        if (depth === 0) continue
        if (depth > most) [most, at] = [depth, wavelength]
        break
      }
    }
  }
  return most > RESOLVED
    ? [
        `grid: the first cell with dust has optical depth ${most.toPrecision(2)} at ${wavelengthLabel(at)}, where a star shines; the temperature at the inner edge is a mean over it; ask for more radial cells`
      ]
    : []
}

/** How many times fewer cells have so many times the error: it falls as the square of their sides. */
const CELLS_FOR_ERROR = 1.5

/** An octree that stopped growing because its cells or its levels were used up. */
function crowded({ walls, cells, scene }: Model): string[] {
  if (!isOctree(walls)) return []
  const { cellsAtMost } = scene.grid
  const tolerance = octreeTolerance(scene)
  if (walls.error <= tolerance) return []
  const doubt = `grid: ${cells} cells may get ${percent(Math.min(1, walls.error))} of the light of the dust wrong, more than ${scene.effort.precision === null ? percent(tolerance) : `the ${percent(tolerance)} asked for`}`
  if (cells + 7 <= cellsAtMost) return [`${doubt}; ask for smaller ones by grid.finest of an octree`]
  const needed = cells * (walls.error / tolerance) ** CELLS_FOR_ERROR
  return [`${doubt}; ask for about ${needed.toPrecision(2)} by grid.cells-at-most of an octree`]
}

function extinction(components: DustComponent[], cell: number, wavelength: number): number {
  return components.reduce((sum, { density, law }) => {
    return density[cell] > 0 ? sum + density[cell] * (law.absorption(wavelength) + law.scattering(wavelength)) : sum
  }, 0)
}

function starInDust({ stars, components }: Model): string[] {
  return stars.flatMap(({ spec: star }) =>
    components.flatMap(({ spec, shape }) => {
      if (star.radius === undefined || star.radius <= shape.innerRadius) return []
      // A point may sit in dust that reaches the origin: then its radius means nothing.
      if (star.extent === 'point' && shape.innerRadius === 0) return []
      const overlap = `source ${star.name}: its radius, ${au(star.radius)}, is larger than the cavity of dust ${spec.name} (${au(shape.innerRadius)})`
      return [
        star.extent === 'sphere'
          ? `${overlap}; dust inside the star counts in the mass but is neither lit nor seen`
          : `${overlap}; as a point it lights that dust as if all light came from the centre; use extent: sphere`
      ]
    })
  )
}

function fields({ scene, components }: Model): string[] {
  if (components.length === 0) return []
  const diameter = 2 * Math.max(...components.map(({ shape }) => shape.outerRadius))
  return scene.cameras.flatMap((camera) => {
    if (isFromPlace(camera.view)) return []
    const [width, height] = camera.field.map((angle) => angle * scene.distance)
    const pixel = Math.max(width / camera.pixels[0], height / camera.pixels[1])
    return pixel > diameter ? [`camera ${camera.name}: a pixel (${au(pixel)}) is larger than the source (${au(diameter)})`] : []
  })
}

function extrapolated({ scene, components, stars, fields }: Model): string[] {
  const laws = new Map(components.map(({ spec, law }) => [spec.opacity, law]))
  return [...laws].flatMap(([name, { range }]) => {
    const observed = observedWavelengths(scene).filter((wavelength) => wavelength < range[0] || wavelength > range[1])
    const shining = [...stars, ...fields.map(asStar)]
      .filter(({ spectrum }) => shareBeyond(spectrum, range) > BEYOND)
      .map(({ spec }) => spec.name)
    const what = [
      ...(observed.length > 0
        ? [`${observed.length} observed wavelengths (${wavelengthLabel(observed[0])}${observed.length > 1 ? ' ...' : ''})`]
        : []),
      ...(shining.length > 0 ? [`light of ${shining.join(', ')}`] : [])
    ]
    if (what.length === 0) return []
    const [from, to] = range.map((wavelength) => wavelengthLabel(wavelength))
    return [`opacity ${name}: it is given from ${from} to ${to} and is extrapolated for ${what.join(' and ')}`]
  })
}

/** The intensity of a field in place of a luminosity: only shares of it count. */
function asStar({ spec, spectrum: { intensity, intensityNu, range } }: Model['fields'][number]) {
  return { spec, spectrum: { luminosity: intensity, luminosityNu: intensityNu, range } }
}

/** Share of a source's light at wavelengths outside a range (cm). */
function shareBeyond(
  { luminosity, luminosityNu, range }: Pick<StarSpectrum, 'luminosity' | 'luminosityNu' | 'range'>,
  [from, to]: [number, number]
): number {
  const inside = [Math.max(from, range[0]), Math.min(to, range[1])]
  if (inside[0] >= inside[1]) return 1
  const perLog = (x: number) => {
    const nu = LIGHT_SPEED / Math.exp(x)
    return nu * luminosityNu(nu)
  }
  return 1 - integrate(perLog, Math.log(inside[0]), Math.log(inside[1]), 1e-4) / luminosity
}

function au(length: number): string {
  return `${Number((length / AU).toPrecision(3))} au`
}
