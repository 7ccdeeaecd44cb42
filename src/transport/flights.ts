import { sphericalOf } from '../grid/cells.js'
import { Kernel } from '../kernels/kernel.js'
import { logTables } from '../math/exponential.js'
import { streamState } from '../math/random.js'
import { importanceOf, meanImportance } from './importance.js'
import {
  centralRadius2,
  FLIGHT_BINS,
  flightLookup,
  type ScatterLaunch,
  type ScatterMedium,
  scatteringOf
} from './scatter-medium.js'

interface Exports {
  CELLS: WebAssembly.Global
  TALLY: WebAssembly.Global
  BIN_OF_FLIGHT: WebAssembly.Global
  LOG_TABLES: WebAssembly.Global
  startStream: (s0: number, s1: number, s2: number, carry: number) => void
  tallyFlights: (medium: number) => void
}

let opened: Kernel<Exports> | undefined

/** One for each thread. */
function flightsKernel(): Kernel<Exports> {
  if (opened) return opened
  const kernel = new Kernel<Exports>('flights')
  const { memory, BIN_OF_FLIGHT, LOG_TABLES } = kernel.exports
  const { lookup } = flightLookup()
  new Uint8Array(memory.buffer, BIN_OF_FLIGHT.value, lookup.length).set(lookup)
  kernel.doubles(LOG_TABLES.value, logTables.length).set(logTables)
  opened = kernel
  return kernel
}

/**
 * Light in flight in cells of one dimension: sum of weight x path (erg/s/Hz cm) by radial cell and by the angle between the
 * flight and the radius; cells x FLIGHT_BINS. The point of a segment that decides its bin is drawn along it, so that long
 * segments are shared out without bias: at golden steps, in units of 2^-32, from a random one.
 *
 * By symmetry a packet is known by its radius and the cosine of its direction with it. Along a flight of impact parameter b and
 * path s from the closest approach, r^2 = b^2 + s^2 and the cosine is s / r.
 *
 * Packets are split where their light comes nearer to the outside and play roulette where it goes deeper, so that as many are under way
 * at any depth (weight windows, common practice).
 *
 * The loop itself is kernels/flights; its random numbers are those of `stream(seedText)`.
 */
export function tallyFlights(medium: ScatterMedium, packets: number, seedText: string): Float64Array {
  const kernel = flightsKernel()
  const { CELLS, TALLY, startStream, tallyFlights } = kernel.exports
  const { cells, extinction } = medium
  const { r } = sphericalOf(medium.walls)
  const importance = importanceOf(medium)
  kernel.clear()
  const place = kernel.lay(mediumRecord(kernel, medium, packets, importance))

  const records = kernel.doubles(CELLS.value, 4 * (cells + 1))
  for (let cell = 0; cell < cells; cell++) {
    records[4 * cell] = r[cell] * r[cell]
    records[4 * cell + 1] = extinction[cell]
    records[4 * cell + 2] = extinction[cell] > 0 ? scatteringOf(medium, cell) / extinction[cell] : 0
    records[4 * cell + 3] = importance[cell]
  }
  records[4 * cells] = r[cells] * r[cells]
  const tally = kernel.doubles(TALLY.value, cells * FLIGHT_BINS).fill(0)

  const { s0, s1, s2, c } = streamState(seedText)
  startStream(s0, s1, s2, c)
  tallyFlights(place)
  return tally.slice()
}

/** `Medium` of kernels/flights, with what it points to. */
function mediumRecord(kernel: Kernel<Exports>, medium: ScatterMedium, packets: number, importance: Float64Array): number[] {
  const { cells, walls, asymmetry, scattering, launch, launchTable } = medium
  const sources = launch.flatMap((source, i) => {
    const chance = launchTable.cumulative[i] - (i === 0 ? 0 : launchTable.cumulative[i - 1])
    return sourceRecord(kernel, source, 1 / (chance * packets), meanImportance(source, importance))
  })
  return [
    packets,
    cells,
    centralRadius2(medium),
    kernel.lay(sphericalOf(walls).r),
    asymmetry.length,
    kernel.lay(asymmetry),
    kernel.lay(scattering),
    kernel.lay(sources),
    kernel.lay(launchTable.cumulative),
    kernel.lay(launchTable.guide, Int32Array),
    launchTable.guideSize
  ]
}

/** In the order in which kernels/flights/source.ts numbers them. */
const SOURCE_KINDS = ['point-star', 'ambient', 'sphere-star', 'dust']

/** `Source` of kernels/flights; `scale`: one over the number of packets that a source of that chance gets. */
function sourceRecord(kernel: Kernel<Exports>, source: ScatterLaunch, scale: number, meanImportance: number): number[] {
  const power = (source.kind === 'point-star' ? source.removed : source.luminosity) * scale
  const radius = source.kind === 'sphere-star' ? source.radius : 0
  const depths = source.kind === 'point-star' ? source.opticalDepth : []
  const cells = source.kind === 'dust' ? source.cells : undefined
  const table = cells ? [kernel.lay(cells.cumulative), kernel.lay(cells.guide, Int32Array), cells.guideSize] : [0, 0, 0]
  return [
    SOURCE_KINDS.indexOf(source.kind),
    power,
    meanImportance * power,
    radius,
    kernel.lay(depths),
    -Math.expm1(-(depths.at(-1) ?? 0)),
    ...table
  ]
}
