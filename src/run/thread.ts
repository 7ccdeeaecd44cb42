import { integrateAperture } from '../camera/aperture.js'
import type { PixelFrame } from '../camera/frame.js'
import { type FieldData, openField } from '../camera/ray-field.js'
import { pictureRows } from '../camera/rows.js'
import { type GrainTableRequest, mixtureOptics } from '../dust/grains/tabulate-grains.js'
import type { ScatteringTables } from '../dust/scattering-tables.js'
import { stream } from '../math/random.js'
import { type LightRequest, lightTowards } from '../solve/light-towards.js'
import { turningMatrices } from '../solve/scattered-stokes.js'
import { type ColumnsRequest, fillColumns } from '../solve/star-columns.js'
import type { Detector } from '../transport/detector.js'
import { propagateEnergy } from '../transport/equilibrium.js'
import type { EquilibriumMedium } from '../transport/equilibrium-medium.js'
import { tallyExits } from '../transport/exit.js'
import { tallyFlights } from '../transport/flights.js'
import type { Observers } from '../transport/observers.js'
import { type PixelTally, tallyPeeled } from '../transport/peel.js'
import type { ScatterMedium } from '../transport/scatter-medium.js'
import { tallyStokesFlights } from '../transport/stokes-flights.js'
import { tallyStokesTowards } from '../transport/stokes-towards.js'
import { tallyTowards } from '../transport/towards.js'
import { type Shared, serve } from '../workers/serve.js'
import { looks } from './look.js'

/** What every batch of packets is told. */
interface Batch {
  packets: number
  seed: string
}

interface ApertureRequest {
  data: FieldData
  radius: number
  tolerance: number
  mirrored: boolean
}

interface RowsRequest {
  frame: PixelFrame
  from: number
  to: number
  tolerance: number
  floor: number
  mirrored: boolean
}

const scattering = (shared: Shared) => shared('scattering') as ScatterMedium
const field = (shared: Shared) => openField(shared('field') as FieldData)

/** Runs on every worker thread: the work that a run hands out, by name. */
serve({
  grains: (wavelength: number, shared: Shared) => {
    const { populations, angles } = shared('grains') as Pick<GrainTableRequest, 'populations' | 'angles'>
    return mixtureOptics(populations, [wavelength], angles)
  },
  equilibrium: ({ packets, seed }: Batch, shared: Shared) =>
    propagateEnergy(shared('equilibrium') as EquilibriumMedium, packets, stream(seed)),
  flights: ({ packets, seed }: Batch, shared: Shared) => tallyFlights(scattering(shared), packets, seed),
  towards: ({ packets, seed, observers }: Batch & { observers: Observers }, shared: Shared) =>
    tallyTowards(scattering(shared), observers, packets, stream(seed)),
  'stokes-flights': ({ packets, seed }: Batch, shared: Shared) => tallyStokesFlights(scattering(shared), packets, stream(seed)),
  'stokes-towards': ({ packets, seed, observers }: Batch & { observers: Observers }, shared: Shared) =>
    tallyStokesTowards(scattering(shared), observers, packets, stream(seed)),
  peeled: ({ packets, seed, detectors }: Batch & { detectors: Detector[] }, shared: Shared) =>
    inOne(tallyPeeled(scattering(shared), detectors, packets, stream(seed))),
  exits: ({ packets, seed, detectors }: Batch & { detectors: Detector[] }, shared: Shared) =>
    inOne(tallyExits(scattering(shared), detectors, packets, stream(seed))),
  'star-columns': ({ from, to }: { from: number; to: number }, shared: Shared) =>
    fillColumns(shared('star-columns') as ColumnsRequest, from, to),
  scattered: (request: LightRequest) => lightTowards(request),
  turning: (tables: ScatteringTables) => turningMatrices(tables),
  ...looks,
  rows: ({ frame, from, to, tolerance, floor, mirrored }: RowsRequest, shared: Shared) =>
    pictureRows(field(shared), frame, from, to, tolerance, floor, mirrored),
  aperture: ({ data, radius, tolerance, mirrored }: ApertureRequest) =>
    integrateAperture(openField(data), radius, tolerance, mirrored)
})

/** Direct, emitted and scattered light of all pixels as one tally, and Q, U and V where they are known. */
function inOne({
  direct,
  emitted,
  scattered,
  stokes = []
}: Omit<PixelTally, 'stokes'> & { direct?: Float64Array; stokes?: Float64Array[] }): Float64Array {
  const tally = new Float64Array((3 + stokes.length) * emitted.length)
  if (direct) tally.set(direct)
  tally.set(emitted, emitted.length)
  tally.set(scattered, 2 * emitted.length)
  for (const [i, part] of stokes.entries()) tally.set(part, (3 + i) * emitted.length)
  return tally
}
