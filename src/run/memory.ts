import { isOctree } from '../grid/cells.js'
import type { Model } from '../model/model.js'
import { observedWavelengths } from '../model/wavelengths.js'
import { hasAmbient } from '../scene/has-ambient.js'
import { isFromPlace } from '../scene/is-from-place.js'
import { isPolarised } from '../scene/is-polarised.js'
import { needsEquilibrium } from '../solve/equilibrium.js'
import { GROUPS } from '../solve/groups.js'
import { MOST_NEAR } from '../solve/near-cells.js'
import { ANGLE_NODES, POLAR_NODES } from '../solve/scattered-light.js'
import { NEAR_DIRECTIONS } from '../transport/observers.js'
import { LEVEL_SIZE } from '../transport/random-walk.js'
import { AZIMUTH_BINS, FLIGHT_BINS } from '../transport/scatter-medium.js'

/** The program before it does anything, and each worker; measured with Node 20 on Linux, to a third or so. */
const PROGRAM_BYTES = 120e6
const WORKER_BYTES = 40e6
/** Results of a worker that wait for their turn. */
const WAITING = 4
/** Wavelength bins times rows of a table of dust emission, with its guide. */
const TABLE_BYTES = 5e6

/** Levels of the random walk in a cell, of which thick ones have up to ten and thin ones none. */
const WALK_LEVELS = 3

/** Wavelengths that are under way at a time hold no more than this together, bytes, unless one alone does. */
const ABREAST_BYTES = 1e9

/** What the estimate needs to know of a model: the cells need not be filled yet. */
export type Sizes = Pick<Model, 'scene' | 'dimensions' | 'walls' | 'cells'>

/** Parts of the memory that a run is expected to hold, bytes; together good to a factor of two. */
export interface MemoryEstimate {
  program: number
  /** Of each worker: the thread and the results that wait for their turn. */
  worker: number
  /** Cells with what is in them, sums of packets, and the copy of these that is written to disk. */
  cells: number
  images: number
}

export function memoryEstimate(sizes: Sizes, workers: number): MemoryEstimate {
  const { cells, scene } = sizes
  const components = scene.dust.length
  const { bins, seen, parts } = seenLight(sizes)
  const tally = 8 * Math.max(cells * components, (cells * seen * bins + nearValues(sizes)) * parts)
  const heat = needsEquilibrium(scene)
    ? components * (TABLE_BYTES + cells * 8 * (6 + 2 * GROUPS + GROUPS / 2)) + 8 * cells * LEVEL_SIZE * WALK_LEVELS
    : 0
  const light = lightBytes(sizes)
  const sizesOf = scene.cameras.map(({ pixels, wavelengths }) => [pixels[0] * pixels[1], wavelengths.length])
  const values = sizesOf.reduce((sum, [pixels, count]) => sum + pixels * count, 0)
  const columns = sizesOf.reduce((sum, [pixels]) => sum + pixels, 0)
  const largest = Math.max(0, ...sizesOf.map(([pixels, count]) => pixels * count))
  const planes = 5 + GROUPS / 8 + (parts > 1 ? 6 : 0) + (hasAmbient(scene) ? 1 : 0)
  return {
    program: PROGRAM_BYTES,
    worker: WORKER_BYTES + WAITING * tally,
    cells: Math.max(heat, light * wavelengthsAbreast(sizes, workers)) + 8 * cells * (1 + components) + cubeBytes(sizes),
    // Column density once; five planes and the modes of noise, six more with polarisation, one with ambient light; written out once more,
    // and joined.
    images: columns * 8 + values * 8 * planes + largest * 8 * (2 * planes + 2)
  }
}

/** An octree, bytes a cell: a record and a corner for seven cells, place and profile of each, and cuts of the fewer that are cut. */
const CUBE_BYTES = 23

/** An octree, the columns from its cells to point stars, and the densities that these are made of. */
function cubeBytes({ scene, walls, cells }: Sizes): number {
  if (!isOctree(walls)) return 0
  const points = scene.sources.filter((source) => source.kind === 'star' && source.extent === 'point').length
  return cells * (CUBE_BYTES + (points > 0 ? scene.dust.length * (8 + 32 * points) : 0))
}

/** How many wavelengths so many workers go on with at a time: while packets of one fly, rays of another are traced. */
export function wavelengthsAbreast(sizes: Sizes, workers: number): number {
  return workers === 1 ? 1 : Math.max(1, Math.min(workers + 1, Math.floor(ABREAST_BYTES / lightBytes(sizes))))
}

/** Sums of packets and scattered light of a wavelength, bytes. */
function lightBytes(sizes: Sizes): number {
  const { bins, slots, seen, parts } = seenLight(sizes)
  const known = sizes.cells * seen * parts * (8 * bins * 2 * GROUPS + slots * (8 + 4 * GROUPS))
  return Math.max(1, known + nearValues(sizes) * parts * (8 * 2 * GROUPS + 8 + 4 * GROUPS))
}

/** Values of the cells near to observers at places of three dimensions, at most. */
function nearValues({ scene, dimensions, cells }: Sizes): number {
  const places = dimensions === 3 ? scene.cameras.filter(({ view }) => isFromPlace(view)).length : 0
  return places * Math.min(cells, MOST_NEAR) * NEAR_DIRECTIONS
}

/** Values of the tally and of the scattered light for each cell and observer, the most observers of a wavelength, Stokes parameters. */
function seenLight(sizes: Sizes): { bins: number; slots: number; seen: number; parts: number } {
  const { dimensions, scene } = sizes
  const observers = Math.max(0, ...observedWavelengths(scene).map((wavelength) => observersAt(sizes, wavelength)))
  const [bins, slots] = { 1: [FLIGHT_BINS, ANGLE_NODES], 2: [AZIMUTH_BINS, AZIMUTH_BINS], 3: [1, 1] }[dimensions]
  const seen = dimensions === 1 ? Math.min(1, observers) : observers
  // Stokes parameters: I and Q in one dimension, else all four; rays need them apart.
  const parts = isPolarised(scene) ? (dimensions === 1 ? 2 : 4) : 1
  return { bins, slots, seen, parts }
}

/** The whole of an estimate with so many workers, bytes. */
export function totalMemory({ program, worker, cells, images }: MemoryEstimate, workers: number): number {
  return program + worker * workers + cells + images
}

function observersAt({ scene, dimensions }: Sizes, wavelength: number): number {
  const all = [...scene.cameras, ...scene.spectra].filter(({ wavelengths }) => wavelengths.includes(wavelength))
  const near = all.filter(({ view }) => isFromPlace(view)).length
  return all.length - near + (dimensions === 2 && near > 0 ? POLAR_NODES : near)
}
