import { allocateShared } from '../math/allocate.js'
import { makeSamplingTable } from '../math/cdf.js'
import type { Model } from '../model/model.js'
import type { ScatterLaunch, ScatterMedium } from '../transport/scatter-medium.js'
import type { DustLight } from './dust-light.js'

/** Least share of the packets that each kind of source gets. */
const LEAST_SHARE = 0.1

/** Lays out the dust and the sources at one wavelength for packets. */
export function scatterMedium(model: Model, light: DustLight): ScatterMedium {
  const { walls, cells, volume, stars } = model
  const launch: ScatterLaunch[] = []
  const powers: number[] = []
  let points = 0
  for (const { spec, spectrum } of stars) {
    const luminosity = spectrum.luminosityNu(light.nu)
    if (spec.extent === 'point') points += luminosity
    else if (luminosity > 0) {
      launch.push({ kind: 'sphere-star', luminosity, radius: spec.radius! })
      powers.push(luminosity)
    }
  }
  const nr = walls.r.length - 1
  const np = walls.phi.length - 1
  const columns = (walls.cosTheta.length - 1) * np
  const caught = new Float64Array(columns)
  for (let column = 0; column < columns; column++) {
    const it = Math.floor(column / np)
    const solidAngle = (walls.cosTheta[it] - walls.cosTheta[it + 1]) * (walls.phi[(column % np) + 1] - walls.phi[column % np])
    caught[column] = (-Math.expm1(-light.opticalDepth[column * (nr + 1) + nr]) * solidAngle) / (4 * Math.PI)
  }
  const removed = points * caught.reduce((sum, share) => sum + share, 0)
  if (removed > 0) {
    launch.push({
      kind: 'point-star',
      luminosity: points,
      removed,
      columns: makeSamplingTable(caught, 1, columns, allocateShared),
      opticalDepth: light.opticalDepth
    })
    powers.push(removed)
  }
  const inwards = 4 * Math.PI ** 2 * walls.r[nr] ** 2 * ambientIntensity(model, light.nu)
  if (inwards > 0) {
    launch.push({ kind: 'ambient', luminosity: inwards })
    powers.push(inwards)
  }
  const emitted = light.emission.map((value, cell) => 4 * Math.PI * value * volume[cell])
  const glow = emitted.reduce((sum, value) => sum + value, 0)
  if (glow > 0) {
    launch.push({ kind: 'dust', luminosity: glow, cells: makeSamplingTable(emitted, 1, cells, allocateShared) })
    powers.push(glow)
  }
  const total = powers.reduce((sum, value) => sum + value, 0)
  return {
    walls,
    cells,
    extinction: light.extinction,
    asymmetry: light.asymmetry,
    ...(light.tables && { tables: light.tables }),
    scattering: light.scattering,
    launch,
    launchTable: makeSamplingTable(
      Float64Array.from(powers, (power) => Math.max(power / total, LEAST_SHARE)),
      1,
      powers.length
    ),
    starRadius: largestStar(model)
  }
}

/** Radius of the largest star that is a sphere, cm; 0 for none. */
export function largestStar(model: Model): number {
  return model.stars.reduce((most, { spec }) => (spec.extent === 'sphere' ? Math.max(most, spec.radius!) : most), 0)
}

/** Specific intensity of all ambient fields together, erg/s/cm2/Hz/sr. */
export function ambientIntensity({ fields }: Pick<Model, 'fields'>, nu: number): number {
  return fields.reduce((sum, { spectrum }) => sum + spectrum.intensityNu(nu), 0)
}
