import { henyeyGreenstein } from '../dust/phase-function.js'
import { peakOf, type ScatteringTables } from '../dust/scattering-tables.js'
import type { SphericalWalls } from '../grid/geometry.js'
import { allocateShared } from '../math/allocate.js'
import type { Model } from '../model/model.js'
import type { DustLight } from '../solve/dust-light.js'
import { largestStar } from '../solve/scatter-medium.js'
import type { PolarisedPart, ScatteredLight } from '../solve/scattered-light.js'

/** What the intensity along rays to one observer at one wavelength follows from, as flat arrays that all threads share. */
export interface RayMedium {
  walls: SphericalWalls
  cells: number
  /** Extinction coefficient, cm-1, by cell. */
  extinction: Float64Array
  /** Thermal emission coefficient, erg/s/cm3/Hz/sr, by cell. */
  emission: Float64Array
  /** cells x GROUPS: deviations of the groups' estimates from `emission`; empty when temperatures are given. */
  emissionGroups: Float32Array
  /** Emission coefficient of scattered light other than first scatterings of point stars; by cell x slots. */
  scattered: Float64Array
  /** As `scattered` x GROUPS: deviations of the groups' estimates. */
  scatteredGroups: Float32Array
  /** Values a cell: ANGLE_NODES in one dimension, AZIMUTH_BINS in two, 1 in three; 0 when nothing scatters. */
  slots: number
  /** As `scattered`, the other Stokes parameters; absent where no law polarises or nothing scatters. */
  polarised?: PolarisedPart
  /** Some law polarises: rays have POLARISED_VALUES numbers. */
  polarising: boolean
  /** First scatterings of the point stars at the origin, calculated exactly; absent without them. */
  starlight?: Starlight
  /** Radius of the largest star that is a sphere, cm; it hides what lies behind. */
  starRadius: number
}

export interface Starlight {
  /** All point stars together, erg/s/Hz. */
  luminosity: number
  /** columns x (nr + 1): optical depth from the origin to each radial wall; columns it * np + ip. */
  opticalDepth: Float64Array
  asymmetry: Float64Array
  /** laws x cells, cm-1. */
  scattering: Float64Array
  /** The laws as tables, where not all are Henyey-Greenstein. */
  tables?: ScatteringTables
  /** By cell: the most that light scattered once can emit there in any direction, erg/s/cm3/Hz/sr. */
  brightest: Float64Array
}

/** Puts together what rays need; without `scattered` only first scatterings are seen. */
export function rayMedium(model: Model, light: DustLight, scattered: ScatteredLight | undefined): RayMedium {
  const luminosity = model.stars.reduce(
    (sum, { spec, spectrum }) => (spec.extent === 'point' ? sum + spectrum.luminosityNu(light.nu) : sum),
    0
  )
  return {
    walls: model.walls,
    cells: model.cells,
    extinction: light.extinction,
    emission: light.emission,
    emissionGroups: light.emissionGroups,
    scattered: scattered?.value ?? new Float64Array(),
    scatteredGroups: scattered?.groups ?? new Float32Array(),
    slots: scattered?.slots ?? 0,
    ...(scattered?.polarised && { polarised: scattered.polarised }),
    polarising: light.tables?.polarising ?? false,
    ...(luminosity > 0 && {
      starlight: {
        luminosity,
        opticalDepth: light.opticalDepth,
        asymmetry: light.asymmetry,
        scattering: light.scattering,
        ...(light.tables && { tables: light.tables }),
        brightest: brightestScattering(model, light, luminosity)
      }
    }),
    starRadius: largestStar(model)
  }
}

/** The star's light at the inner wall of each cell, scattered in the direction that the law favours most. */
function brightestScattering({ walls, cells }: Model, light: DustLight, luminosity: number): Float64Array {
  const { asymmetry, scattering, opticalDepth, tables } = light
  const nr = walls.r.length - 1
  const columns = (walls.cosTheta.length - 1) * (walls.phi.length - 1)
  const brightest = new Float64Array(allocateShared(8 * cells))
  const peaks = Array.from(asymmetry, (g, law) => (tables ? peakOf(tables, law) : henyeyGreenstein(g, Math.sign(g))))
  for (let cell = 0; cell < cells; cell++) {
    const column = cell === 0 ? 0 : (cell - 1) % columns
    const ir = cell === 0 ? 0 : 1 + Math.floor((cell - 1) / columns)
    let most = 0
    peaks.forEach((peak, law) => {
      most += peak * scattering[law * cells + cell]
    })
    const dimming = Math.exp(-opticalDepth[column * (nr + 1) + ir])
    if (most > 0) brightest[cell] = (most * luminosity * dimming) / (4 * Math.PI * walls.r[ir] ** 2)
  }
  return brightest
}
