import type { Model } from '../model/model.js'
import { observedWavelengths } from '../model/wavelengths.js'
import { GROUPS } from '../solve/groups.js'
import { ANGLE_NODES } from '../solve/scattered-light.js'
import { AZIMUTH_BINS, FLIGHT_BINS } from '../transport/scatter-medium.js'

/** The program before it does anything, and each worker; measured with Node 20 on Linux, to a third or so. */
const PROGRAM_BYTES = 120e6
const WORKER_BYTES = 40e6
/** Results of a worker that wait for their turn. */
const WAITING = 4
/** Wavelength bins times rows of a table of dust emission, with its guide. */
const TABLE_BYTES = 5e6

/** Most memory that a run is expected to hold, bytes; good to a factor of two. */
export function memoryEstimate(model: Model, workers: number): number {
  const { cells, components, dimensions, scene } = model
  const tallies = WAITING * workers + GROUPS
  const heat = components.length * (TABLE_BYTES + cells * 8 * (6 + tallies + GROUPS / 2))
  const observers = Math.max(0, ...observedWavelengths(scene).map((wavelength) => observersAt(model, wavelength)))
  const [bins, slots] = { 1: [FLIGHT_BINS, ANGLE_NODES], 2: [AZIMUTH_BINS, AZIMUTH_BINS], 3: [1, 1] }[dimensions]
  const seen = dimensions === 1 ? Math.min(1, observers) : observers
  const light = cells * seen * (8 * bins * tallies + slots * (8 + 4 * GROUPS))
  const values = scene.cameras.reduce((sum, { pixels, wavelengths }) => sum + pixels[0] * pixels[1] * wavelengths.length, 0)
  // Five planes; written out once more, and joined.
  const images =
    values * 8 * 5 +
    Math.max(0, ...scene.cameras.map(({ pixels, wavelengths }) => pixels[0] * pixels[1] * wavelengths.length)) * 8 * 12
  return PROGRAM_BYTES + WORKER_BYTES * workers + Math.max(heat, light) + images
}

function observersAt({ scene }: Model, wavelength: number): number {
  return [...scene.cameras, ...scene.spectra].filter(({ wavelengths }) => wavelengths.includes(wavelength)).length
}
