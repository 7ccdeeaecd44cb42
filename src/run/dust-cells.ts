import { isOctree, sphericalOf } from '../grid/cells.js'
import type { SphericalWalls } from '../grid/geometry.js'
import { cellCube, type Octree } from '../grid/octree/octree.js'
import type { Model } from '../model/model.js'
import type { MeridionalStructure, RadialComponent, RadialStructure } from '../output/plot/structure.js'
import type { DustTemperatures } from '../solve/dust-temperatures.js'
import { AU } from '../units/constants.js'

/** Columns of the table of cells, in FITS units: centre, volume, and for each component density, temperature, 1 sigma. */
export function cellColumns(model: Model, dust: DustTemperatures): Column[] {
  return [
    ...placeColumns(model),
    { name: 'volume', unit: 'cm3', values: model.volume },
    ...model.components.flatMap(({ spec: { name }, density }, c) => [
      { name: `density_${name}`, unit: 'g cm-3', values: density },
      { name: `temperature_${name}`, unit: 'K', values: ofComponent(model, dust.temperature, c) },
      { name: `sigma_temperature_${name}`, unit: 'K', values: ofComponent(model, dust.sigma, c) }
    ])
  ]
}

interface Column {
  name: string
  unit: string
  values: Float64Array
}

function placeColumns(model: Model): Column[] {
  const inAu = (values: Float64Array) => values.map((value) => value / AU)
  if (isOctree(model.walls)) {
    const middles = cubeMiddles(model.walls)
    return middles.map((values, a) => ({ name: 'xyz'[a], unit: 'AU', values: inAu(values) }))
  }
  const { r, theta, phi } = cellCentres(model.walls, model.cells)
  return [
    { name: 'r', unit: 'AU', values: inAu(r) },
    { name: 'theta', unit: 'rad', values: theta },
    { name: 'phi', unit: 'rad', values: phi }
  ]
}

/** x, y and z (cm) of the middles of all cubes. */
function cubeMiddles(octree: Octree): Float64Array[] {
  const cube = new Float64Array(4)
  const middles = [0, 1, 2].map(() => new Float64Array(octree.cells))
  for (let cell = 0; cell < octree.cells; cell++) {
    cellCube(octree, cell, cube)
    for (let a = 0; a < 3; a++) middles[a][cell] = cube[a]
  }
  return middles
}

/** Distances of the middles of all cells from the origin, cm. */
export function cellRadii({ walls, cells }: Model): Float64Array {
  if (!isOctree(walls)) return cellCentres(walls, cells).r
  const [x, y, z] = cubeMiddles(walls)
  return x.map((value, i) => Math.hypot(value, y[i], z[i]))
}

/** Middles of all cells between their walls: cm and rad. */
export function cellCentres(walls: SphericalWalls, cells: number): Record<'r' | 'theta' | 'phi', Float64Array> {
  const nt = walls.cosTheta.length - 1
  const np = walls.phi.length - 1
  const radii = middles(walls.r)
  const thetas = middles(walls.cosTheta.map(Math.acos))
  const phis = middles(walls.phi)
  const centres = { r: new Float64Array(cells), theta: new Float64Array(cells), phi: new Float64Array(cells) }
  for (let cell = 0; cell < cells; cell++) {
    const column = (cell - 1) % (nt * np)
    centres.r[cell] = radii[cell === 0 ? 0 : 1 + Math.floor((cell - 1) / (nt * np))]
    centres.theta[cell] = cell === 0 ? Math.PI / 2 : thetas[Math.floor(column / np)]
    centres.phi[cell] = cell === 0 ? Math.PI : phis[column % np]
  }
  return centres
}

/** Density of every component by cell, temperature where it emits, and 1 sigma where that is solved for. */
export function shownParts(model: Model, dust: DustTemperatures): RadialComponent[] {
  return model.components.map(({ spec, density }, c) => {
    const emits = spec.temperature !== 'none'
    const temperature = ofComponent(model, dust.temperature, c)
    const sigma = ofComponent(model, dust.sigma, c)
    return { name: spec.name, density, ...(emits && { temperature }), ...(spec.temperature === 'solve' && { sigma }) }
  })
}

/** Dust in spherical cells: all radii where it depends on them alone, else the mean over azimuth outside the core. */
export function dustStructure(model: Model, dust: DustTemperatures): RadialStructure | MeridionalStructure {
  const { components, dimensions } = model
  const walls = sphericalOf(model.walls)
  const parts = shownParts(model, dust)
  if (dimensions === 1) {
    const first = components.some(({ density }) => density[0] > 0) ? 0 : 1
    const outer = (values: Float64Array) => values.subarray(first)
    return {
      kind: 'radial',
      r: outer(middles(walls.r)),
      components: parts.map(({ name, density, temperature, sigma }) => ({
        name,
        density: outer(density),
        ...(temperature && { temperature: outer(temperature) }),
        ...(sigma && { sigma: outer(sigma) })
      }))
    }
  }
  const np = walls.phi.length - 1
  return {
    kind: 'map',
    rWalls: walls.r.subarray(1),
    cosThetaWalls: walls.cosTheta,
    components: parts.map(({ name, density, temperature }) => {
      const weights = density.subarray(1)
      const mean = meanOverAzimuth(weights, np)
      return {
        name,
        density: mean,
        ...(temperature && {
          temperature: meanOverAzimuth(
            temperature.subarray(1).map((value, i) => value * weights[i]),
            np
          ).map((sum, i) => (mean[i] > 0 ? sum / mean[i] : 0))
        })
      }
    })
  }
}

function ofComponent({ cells }: Model, values: Float64Array, component: number): Float64Array {
  return values.subarray(component * cells, (component + 1) * cells)
}

function middles(walls: Float64Array): Float64Array {
  return Float64Array.from({ length: walls.length - 1 }, (_, i) => 0.5 * (walls[i] + walls[i + 1]))
}

function meanOverAzimuth(values: Float64Array, np: number): Float64Array {
  const means = new Float64Array(values.length / np)
  values.forEach((value, i) => {
    means[Math.floor(i / np)] += value / np
  })
  return means
}
