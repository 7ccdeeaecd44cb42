import type { Model } from '../model/model.js'
import type { DustStructure, RadialComponent } from '../output/plot/structure.js'
import type { DustTemperatures } from '../solve/temperatures.js'
import { AU } from '../units/constants.js'

/** Columns of the table of cells, in FITS units: centre, volume, and for each component density, temperature, 1 sigma. */
export function cellColumns(model: Model, dust: DustTemperatures): { name: string; unit: string; values: Float64Array }[] {
  const { r, theta, phi } = cellCentres(model)
  return [
    { name: 'r', unit: 'AU', values: r.map((value) => value / AU) },
    { name: 'theta', unit: 'rad', values: theta },
    { name: 'phi', unit: 'rad', values: phi },
    { name: 'volume', unit: 'cm3', values: model.volume },
    ...model.components.flatMap(({ spec: { name }, density }, c) => [
      { name: `density_${name}`, unit: 'g cm-3', values: density },
      { name: `temperature_${name}`, unit: 'K', values: ofComponent(model, dust.temperature, c) },
      { name: `sigma_temperature_${name}`, unit: 'K', values: ofComponent(model, dust.sigma, c) }
    ])
  ]
}

/** Middles of all cells between their walls: cm and rad. */
export function cellCentres({ walls, cells }: Model): Record<'r' | 'theta' | 'phi', Float64Array> {
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

/** What the picture of the dust shows: all radii of spherical shells, otherwise the mean over azimuth outside the core. */
export function dustStructure(model: Model, dust: DustTemperatures): DustStructure {
  const { walls, components, dimensions } = model
  const parts = components.map(({ spec, density }, c): RadialComponent => {
    const emits = spec.temperature !== 'none'
    const temperature = ofComponent(model, dust.temperature, c)
    const sigma = ofComponent(model, dust.sigma, c)
    return { name: spec.name, density, ...(emits && { temperature }), ...(spec.temperature === 'solve' && { sigma }) }
  })
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
