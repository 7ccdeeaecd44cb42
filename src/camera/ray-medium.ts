import type { ScatteringTables } from '../dust/scattering-tables.js'
import type { SphericalWalls } from '../grid/geometry.js'
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
        ...(light.tables && { tables: light.tables })
      }
    }),
    starRadius: largestStar(model)
  }
}
