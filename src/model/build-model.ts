import type { GrainOptics } from '../dust/grains/grain-optics.js'
import { makeOpacityLaw, type OpacityLaw } from '../dust/opacity-law.js'
import { type Cells, isOctree, volumesOf } from '../grid/cells.js'
import type { DustLayer } from '../grid/dust-layer.js'
import { cellCount, type SphericalWalls } from '../grid/geometry.js'
import { placeWalls } from '../grid/place-walls.js'
import { cutByRims, type Rims } from '../grid/rims.js'
import { allocateShared } from '../math/allocate.js'
import { errorAt } from '../scene/error.js'
import type { DustSpec, Scene } from '../scene/types.js'
import { AmountError, amountScale } from '../shapes/amount-scale.js'
import { makeShape, plainShape } from '../shapes/make-shape.js'
import type { Shape } from '../shapes/shape.js'
import { ambientField } from '../sources/ambient.js'
import { starSpectrum } from '../sources/star.js'
import { cellDensities } from './density.js'
import { hollowed, withFirstRadii } from './inner-radii.js'
import { layCubes, reasonForCubes } from './lay-cubes.js'
import type { DustComponent, Model } from './model.js'
import { octreeDensities } from './octree-density.js'
import { fitProfiles } from './octree-profiles.js'
import { offCentre } from './off-centre.js'
import { mattering } from './wavelengths.js'

/** Cells laid about the dust of a scene, before anything as large as their number is allocated. */
export interface CellPlan extends Pick<Model, 'scene' | 'dimensions' | 'reason' | 'walls' | 'cells' | 'stars' | 'fields'> {
  parts: (DustLayer & { spec: DustSpec; law: OpacityLaw })[]
}

/** Lays the cells of a scene; `tables`: optics of grains by the name of the opacity, where they are known. Throws SceneError where the scene asks for what cannot be. */
export function planCells(scene: Scene, tables: Record<string, GrainOptics> = {}): CellPlan {
  return layCells(
    scene,
    scene.dust.map(({ opacity }) => makeOpacityLaw(scene.opacities[opacity], tables[opacity]))
  )
}

/** The model of another scene whose dust is made of the same. Throws SceneError where the scene asks for what cannot be. */
export function rebuildModel({ components }: Model, scene: Scene): Model {
  return buildModel(
    scene,
    layCells(
      scene,
      components.map(({ law }) => law)
    )
  )
}

function layCells(asked: Scene, laws: OpacityLaw[]): CellPlan {
  const scene = withFirstRadii(asked, laws)
  const stars = scene.sources.flatMap((spec) => (spec.kind === 'star' ? [{ spec, spectrum: starSpectrum(spec) }] : []))
  const fields = scene.sources.flatMap((spec) => (spec.kind === 'ambient' ? [{ spec, spectrum: ambientField(spec) }] : []))
  const wavelengths = mattering(scene, stars, fields)
  const parts = scene.dust.map((spec, index) => {
    const law = laws[index]
    const scale = scaleOf(scene, spec, index, plainShape(spec.shape), law.absorption, law.scattering)
    const extinction = Math.max(...wavelengths.map((wavelength) => law.absorption(wavelength) + law.scattering(wavelength)))
    return { spec, law, shape: shapeOf(scene, spec, index), scale, extinction }
  })
  const dimensions = chooseDimensions(
    scene,
    parts.map(({ shape }) => shape)
  )
  const common = { scene, stars, fields, parts }
  const why = parts.length > 0 ? reasonForCubes(scene, dimensions) : undefined
  if (why) {
    const walls = layCubes(scene, parts)
    return { ...common, dimensions: 3, reason: `cubes of an octree, because ${why}`, walls, cells: walls.cells }
  }
  const walls = shareWalls(parts.length > 0 ? placeWalls({ ...scene.grid, layers: parts, dimensions }) : emptyWalls(scene))
  return { ...common, dimensions, reason: reasonFor(scene, dimensions), walls, cells: cellCount(walls) }
}

/** Turns a scene into cells filled with dust. Throws SceneError where the scene asks for what cannot be. */
export function buildModel(asked: Scene, plan = planCells(asked)): Model {
  const { scene, dimensions, reason, walls, cells, stars, fields, parts } = plan
  const warnings: string[] = []
  const components: DustComponent[] = parts.map(({ spec, law, shape, scale }) => {
    const { density, massRatio } = isOctree(walls) ? octreeDensities(walls, shape, scale) : cellDensities(walls, shape, scale)
    if (Math.abs(massRatio - 1) >= 0.005) {
      warnings.push(
        `dust ${spec.name}: the cells do not resolve its shape (their mass is ${massRatio.toFixed(3)} of what it should be); ask for more cells under grid`
      )
    }
    const mass = scale * shape.totalMass
    const massBefore = spec.hollow === undefined ? mass : scale * makeShape(spec.shape, spec).totalMass
    return { spec, law, shape, scale, mass, massBefore, density }
  })
  if (isOctree(walls)) fitProfiles(walls, parts)
  const volume = volumesOf(walls, new Float64Array(allocateShared(8 * cells)))
  const rims = rimsOf(walls, parts)
  return { scene, dimensions, reason, walls, cells, ...(rims && { rims }), volume, components, stars, fields, warnings }
}

/** Where all dust of spherical cells ends in vertical rims. */
function rimsOf(walls: Cells, parts: CellPlan['parts']): Rims | undefined {
  const ranges = parts.map(({ shape }) => (shape.symmetry === 'axial' ? shape.rims : undefined))
  if (isOctree(walls) || ranges.length === 0 || ranges.includes(undefined)) return undefined
  return cutByRims(walls, Math.min(...ranges.map((range) => range![0])), Math.max(...ranges.map((range) => range![1])))
}

function scaleOf(
  scene: Scene,
  spec: DustSpec,
  index: number,
  shape: Shape,
  absorption: (wavelength: number) => number,
  scattering: (wavelength: number) => number
): number {
  try {
    return amountScale(shape, spec.amount, (wavelength) => absorption(wavelength) + scattering(wavelength))
  } catch (error) {
    if (!(error instanceof AmountError)) throw error
    const path = ['dust', index, 'amount', error.key]
    throw errorAt(scene, path, error.message)
  }
}

/** The shape of a component; a SceneError when nothing is left of it. */
function shapeOf(scene: Scene, spec: DustSpec, index: number): Shape {
  const shape = makeShape(hollowed(spec), spec)
  if (shape.totalMass > 0) return shape
  const [key, message] = spec.carve
    ? ['carve', 'nothing is left of the shape']
    : ['shape', 'the field has no dust within its width']
  const path = ['dust', index, key]
  throw errorAt(scene, path, message)
}

function chooseDimensions(scene: Scene, shapes: Shape[]): 1 | 2 | 3 {
  if (shapes.some(({ symmetry }) => symmetry === 'none')) {
    if (scene.grid.azimuthal === 1) {
      const message = 'the scene is not symmetric about z: more than one cell in azimuth is needed'
      throw errorAt(scene, ['grid', 'azimuthal'], message, '1')
    }
    return 3
  }
  if (scene.grid.azimuthal > 1 || offCentre(scene).length > 0) return 3
  return shapes.every(({ symmetry }) => symmetry === 'spherical') && scene.grid.polar <= 1 ? 1 : 2
}

function reasonFor(scene: Scene, dimensions: 1 | 2 | 3): string {
  if (dimensions === 3)
    return scene.grid.azimuthal > 1
      ? 'three-dimensional spherical cells, because grid.azimuthal asks for them'
      : 'three-dimensional spherical cells, because the scene is not symmetric about z'
  if (dimensions === 1) return 'one-dimensional spherical cells, because the scene has spherical symmetry about the origin'
  if (scene.grid.polar > 1) return 'two-dimensional spherical cells, because grid.polar asks for them'
  return 'two-dimensional spherical cells, because the scene is symmetric about z'
}

/** A scene without dust: one empty cell about the stars. */
function emptyWalls(scene: Scene): SphericalWalls {
  const largest = Math.max(1, ...scene.sources.map((source) => (source.kind === 'star' ? (source.radius ?? 0) : 0)))
  return {
    r: Float64Array.of(0, 2 * largest, 4 * largest),
    cosTheta: Float64Array.of(1, -1),
    phi: Float64Array.of(0, 2 * Math.PI)
  }
}

function shareWalls({ r, cosTheta, phi }: SphericalWalls): SphericalWalls {
  const share = (values: Float64Array) => {
    const copy = new Float64Array(allocateShared(8 * values.length))
    copy.set(values)
    return copy
  }
  return { r: share(r), cosTheta: share(cosTheta), phi: share(phi) }
}
