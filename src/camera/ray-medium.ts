import { henyeyGreenstein } from '../dust/phase-function.js'
import { peakOf, type ScatteringTables } from '../dust/scattering-tables.js'
import { type Cells, isOctree } from '../grid/cells.js'
import type { SphericalWalls } from '../grid/geometry.js'
import { cellCube, type Octree } from '../grid/octree/octree.js'
import type { Rims } from '../grid/rims.js'
import { allocateShared } from '../math/allocate.js'
import type { Model } from '../model/model.js'
import type { DustLight } from '../solve/dust-light.js'
import type { NearLight, PolarisedPart, ScatteredLight } from '../solve/scattered-light.js'
import { sphereStars } from '../solve/sphere-stars.js'
import { beamDepth, type StarBeam } from '../solve/star-beams.js'
import { isForward } from '../transport/scatter-medium.js'

/** What the intensity along rays to one observer at one wavelength follows from, as flat arrays that all threads share. */
export interface RayMedium {
  walls: Cells
  cells: number
  /** Vertical rims in which all dust ends. All coefficients are means over whole cells. */
  rims?: Rims
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
  /** As `ScatteredLight`; 1 when nothing scatters. */
  polarNodes: number
  /** Azimuth bins are narrow forwards: see azimuthLookup. */
  narrow: boolean
  /** As `scattered`, the other Stokes parameters; absent where no law polarises or nothing scatters. */
  polarised?: PolarisedPart
  /** As `ScatteredLight`. */
  near?: NearLight
  /** Some law polarises: rays have POLARISED_VALUES numbers. */
  polarising: boolean
  /** First scatterings of the point stars, calculated exactly; absent without them. */
  starlight?: Starlight
  /** The stars that are spheres, which hide what lies behind: see `spheresOf`. */
  spheres: Float64Array
}

export interface Starlight {
  /** All point stars at the centre of spherical cells together, erg/s/Hz; 0 among cubes. */
  luminosity: number
  /** columns x (nr + 1): optical depth from the origin to each radial wall; columns it * np + ip. */
  opticalDepth: Float64Array
  /** Point stars among cubes, one by one. */
  beams: StarBeam[]
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
    ...(model.rims && { rims: model.rims }),
    extinction: light.extinction,
    emission: light.emission,
    emissionGroups: light.emissionGroups,
    scattered: scattered?.value ?? new Float64Array(),
    scatteredGroups: scattered?.groups ?? new Float32Array(),
    slots: scattered?.slots ?? 0,
    polarNodes: scattered?.polarNodes ?? 1,
    narrow: isForward(light.asymmetry),
    ...(scattered?.polarised && { polarised: scattered.polarised }),
    ...(scattered?.near && { near: scattered.near }),
    polarising: light.tables?.polarising ?? false,
    ...(luminosity > 0 && {
      starlight: {
        luminosity: isOctree(model.walls) ? 0 : luminosity,
        opticalDepth: light.opticalDepth,
        beams: light.beams,
        asymmetry: light.asymmetry,
        scattering: light.scattering,
        ...(light.tables && { tables: light.tables }),
        brightest: isOctree(model.walls)
          ? brightestAmongCubes(model.walls, light)
          : brightestScattering(model.walls, model.cells, light, luminosity)
      }
    }),
    spheres: sphereStars(model)
  }
}

/** The star's light at the inner wall of each cell, scattered in the direction that the law favours most. */
function brightestScattering(walls: SphericalWalls, cells: number, light: DustLight, luminosity: number): Float64Array {
  const { opticalDepth } = light
  const nr = walls.r.length - 1
  const columns = (walls.cosTheta.length - 1) * (walls.phi.length - 1)
  const brightest = new Float64Array(allocateShared(8 * cells))
  const favoured = favouredScattering(light, cells)
  for (let cell = 0; cell < cells; cell++) {
    const column = cell === 0 ? 0 : (cell - 1) % columns
    const ir = cell === 0 ? 0 : 1 + Math.floor((cell - 1) / columns)
    const most = favoured[cell]
    const dimming = Math.exp(-opticalDepth[column * (nr + 1) + ir])
    if (most > 0) brightest[cell] = (most * luminosity * dimming) / (4 * Math.PI * walls.r[ir] ** 2)
  }
  return brightest
}

/** The light of all stars where a cube is nearest to each, dimmed as at its brightest point, scattered as the law favours most. */
function brightestAmongCubes(octree: Octree, light: DustLight): Float64Array {
  const { cells } = octree
  const brightest = new Float64Array(allocateShared(8 * cells))
  const favoured = favouredScattering(light, cells)
  const cube = new Float64Array(4)
  for (let cell = 0; cell < cells; cell++) {
    if (favoured[cell] === 0) continue
    const [x, y, z, length] = cellCube(octree, cell, cube)
    for (const beam of light.beams) {
      const { at, luminosity } = beam
      const distance = Math.hypot(x - at[0], y - at[1], z - at[2]) - length * Math.sqrt(0.75)
      let least = beamDepth(beam, cell, 0)
      for (let k = 1; k < 8; k++) least = Math.min(least, beamDepth(beam, cell, k))
      // Within the cell of the star nothing may be left out.
      brightest[cell] +=
        distance > 0
          ? (favoured[cell] * luminosity * Math.exp(-least)) / (4 * Math.PI * distance * distance)
          : Number.POSITIVE_INFINITY
    }
  }
  return brightest
}

/** Scattering coefficient per sr of every cell in the direction that its laws favour most, cm-1. */
function favouredScattering({ asymmetry, scattering, tables }: DustLight, cells: number): Float64Array {
  const favoured = new Float64Array(cells)
  asymmetry.forEach((g, law) => {
    const peak = tables ? peakOf(tables, law) : henyeyGreenstein(g, Math.sign(g))
    for (let cell = 0; cell < cells; cell++) favoured[cell] += peak * scattering[law * cells + cell]
  })
  return favoured
}
