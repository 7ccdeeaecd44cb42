import { planckNu, planckNuDerivative } from '../dust/planck.js'
import type { ScatteringTables } from '../dust/scattering-tables.js'
import { isOctree } from '../grid/cells.js'
import type { SphericalWalls } from '../grid/geometry.js'
import { allocateShared } from '../math/allocate.js'
import type { Model } from '../model/model.js'
import { LIGHT_SPEED } from '../units/constants.js'
import type { DustTemperatures } from './dust-temperatures.js'
import { GROUPS } from './groups.js'
import { lawsAt } from './laws.js'
import { type StarBeam, starBeams } from './star-beams.js'
import type { StarColumns } from './star-columns.js'

/** The dust of a model at one wavelength, as flat arrays that all threads share. */
export interface DustLight {
  /** cm */
  wavelength: number
  /** Hz */
  nu: number
  /** Extinction coefficient, cm-1, by cell. */
  extinction: Float64Array
  /** Mean cosines of the different scattering laws among the components. */
  asymmetry: Float64Array
  /** The laws as tables, where not all are Henyey-Greenstein. */
  tables?: ScatteringTables
  /** laws x cells: scattering coefficient, cm-1, of the dust with that law. */
  scattering: Float64Array
  /** Thermal emission coefficient, erg/s/cm3/Hz/sr, by cell. */
  emission: Float64Array
  /** cells x GROUPS: deviation of each group's emission coefficient, from its temperatures; empty when all are given. */
  emissionGroups: Float32Array
  /** (nt np) x (nr + 1): optical depth from the origin to each radial wall, by column of spherical cells; empty among cubes. */
  opticalDepth: Float64Array
  /** The light of point stars on its way through cubes, as far as it is known; none in spherical cells. */
  beams: StarBeam[]
}

const shared64 = (length: number) => new Float64Array(allocateShared(8 * length))
const shared32 = (length: number) => new Float32Array(allocateShared(4 * length))

/** Coefficients of every cell at a wavelength (cm); `columns`: what lies before the point stars, where their light is looked for. */
export function dustLight(model: Model, dust: DustTemperatures, wavelength: number, columns: StarColumns[] = []): DustLight {
  const { components, cells } = model
  const nu = LIGHT_SPEED / wavelength
  const laws = lawsAt(components, wavelength)
  const extinction = shared64(cells)
  const scattering = shared64(laws.asymmetry.length * cells)
  const emission = shared64(cells)
  const emissionGroups = shared32(dust.deviation.length > 0 ? cells * GROUPS : 0)
  components.forEach(({ law, density }, c) => {
    const absorptionOpacity = law.absorption(wavelength)
    const scatteringOpacity = law.scattering(wavelength)
    const offset = laws.of[c] * cells
    for (let i = 0; i < cells; i++) {
      const rho = density[i]
      if (!(rho > 0)) continue
      const at = c * cells + i
      const temperature = dust.temperature[at]
      extinction[i] += rho * (absorptionOpacity + scatteringOpacity)
      scattering[offset + i] += rho * scatteringOpacity
      if (!(temperature > 0)) continue
      emission[i] += rho * absorptionOpacity * planckNu(nu, temperature)
      if (dust.deviation.length > 0 && dust.slope[at] > 0) {
        // To first order: a relative change of the absorbed energy changes T by T / slope times it.
        const response = (rho * absorptionOpacity * planckNuDerivative(nu, temperature) * temperature) / dust.slope[at]
        for (let g = 0; g < GROUPS; g++) emissionGroups[i * GROUPS + g] += response * dust.deviation[at * GROUPS + g]
      }
    }
  })
  return {
    wavelength,
    nu,
    extinction,
    asymmetry: laws.asymmetry,
    ...(laws.tables && { tables: laws.tables }),
    scattering,
    emission,
    emissionGroups,
    opticalDepth: isOctree(model.walls) ? new Float64Array() : radialDepths(model.walls, extinction),
    beams: starBeams(columns, components, wavelength, nu)
  }
}

/** Optical depths from the origin outwards, by column. */
function radialDepths(walls: SphericalWalls, extinction: Float64Array): Float64Array {
  const { r } = walls
  const nr = r.length - 1
  const columns = (walls.cosTheta.length - 1) * (walls.phi.length - 1)
  const depths = shared64(columns * (nr + 1))
  for (let column = 0; column < columns; column++) {
    const start = column * (nr + 1)
    for (let ir = 0; ir < nr; ir++) {
      const cell = ir === 0 ? 0 : 1 + (ir - 1) * columns + column
      depths[start + ir + 1] = depths[start + ir] + extinction[cell] * (r[ir + 1] - r[ir])
    }
  }
  return depths
}
