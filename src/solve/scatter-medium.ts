import { isOctree, reachOf } from '../grid/cells.js'
import type { SphericalWalls } from '../grid/geometry.js'
import { allocateShared } from '../math/allocate.js'
import { makeSamplingTable } from '../math/cdf.js'
import type { Model } from '../model/model.js'
import type { ScatterLaunch, ScatterMedium } from '../transport/scatter-medium.js'
import type { DustLight } from './dust-light.js'
import { sphereStars } from './sphere-stars.js'

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
    if (!(luminosity > 0)) continue
    if (spec.extent === 'sphere') launch.push({ kind: 'sphere-star', luminosity, at: spec.at, radius: spec.radius! })
    else if (isOctree(walls)) launch.push({ kind: 'free-star', luminosity, at: spec.at })
    else {
      points += luminosity
      continue
    }
    powers.push(luminosity)
  }
  const caught = isOctree(walls) ? new Float64Array() : caughtInColumns(walls, light.opticalDepth)
  const removed = points * caught.reduce((sum, share) => sum + share, 0)
  if (removed > 0) {
    launch.push({
      kind: 'point-star',
      luminosity: points,
      removed,
      columns: makeSamplingTable(caught, 1, caught.length, allocateShared),
      opticalDepth: light.opticalDepth
    })
    powers.push(removed)
  }
  const inwards = 4 * Math.PI ** 2 * reachOf(walls) ** 2 * ambientIntensity(model, light.nu)
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
    spheres: sphereStars(model)
  }
}

/** Share of the light of a star at the centre that the dust of each column of cells takes out of the direct beam. */
function caughtInColumns({ r, cosTheta, phi }: SphericalWalls, opticalDepth: Float64Array): Float64Array {
  const nr = r.length - 1
  const np = phi.length - 1
  return Float64Array.from({ length: (cosTheta.length - 1) * np }, (_, column) => {
    const it = Math.floor(column / np)
    const solidAngle = (cosTheta[it] - cosTheta[it + 1]) * (phi[(column % np) + 1] - phi[column % np])
    return (-Math.expm1(-opticalDepth[column * (nr + 1) + nr]) * solidAngle) / (4 * Math.PI)
  })
}

/** Specific intensity of all ambient fields together, erg/s/cm2/Hz/sr. */
export function ambientIntensity({ fields }: Pick<Model, 'fields'>, nu: number): number {
  return fields.reduce((sum, { spectrum }) => sum + spectrum.intensityNu(nu), 0)
}
