import { sampleHenyeyGreenstein } from '../../dust/phase-function'
import { GOLDEN } from '../../math/golden'
import { impactParameter, impactWeight } from '../../sources/impact'
import { CELL, CELLS, Cell, drawAsymmetry, Medium, sampleBin } from './medium'
import { Random } from './random'

/** The kinds of sources, in the order of `SOURCE_KINDS` in transport/flights.ts; the others are dust. */
const POINT_STAR: f64 = 0
const AMBIENT: f64 = 1
const SPHERE_STAR: f64 = 2

/** A source, as doubles alone: see `Medium`. */
@unmanaged
export class Source {
  kind: f64
  /** Power of one of its packets, erg/s/Hz; of a point star the share of its light that the dust takes out of the beam. */
  power: f64
  /** Weight x importance of its packets on average. */
  worth: f64
  /** Of a sphere, cm. */
  radius: f64
  /** Optical depth from a point star to each wall, and the share of its light that all dust takes out. */
  depths: f64
  caught: f64
  /** Table of the cells that emit. */
  cumulative: f64
  guide: f64
  guideSize: f64
}
const SOURCE = 72

/** The packet last started: radial cell, radius (cm), cosine of its direction with the radius, power (erg/s/Hz). */
export let startCell: i32 = 0
export let startRadius: f64 = 0
export let startMu: f64 = 0
export let startWeight: f64 = 0

/** Where the even sequence of impact parameters of ambient light begins; drawn when first needed in a batch. */
let lattice: f64 = -1

export function startBatch(): void {
  lattice = -1
}

/** Starts packet n and returns its source; n chooses the source evenly among the packets of the batch. */
export function startPacket(medium: Medium, n: i32): Source {
  const choice = (<f64>n + Random.uniform()) / medium.packets
  const index = sampleBin(<usize>medium.cumulative, <usize>medium.guide, medium.guideSize, choice)
  const source = changetype<Source>(<usize>medium.sources + index * SOURCE)
  const kind = source.kind
  if (kind === POINT_STAR) startAtScattering(medium, source)
  else if (kind === AMBIENT) startFromOutside(medium, source, n)
  else if (kind === SPHERE_STAR) startFromSphere(medium, source)
  else startFromDust(medium, source)
  return source
}

/**
 * Straight from the star to the first scattering, which is certain: half of them at depths as nature has them, half evenly deep, so
 * that dust that little light reaches is not left dark. The weight sets that right, and is twice nature's at most (composite biasing,
 * Baes et al. 2016, A&A 590, A55).
 */
function startAtScattering(medium: Medium, source: Source): void {
  const radii = <usize>medium.radii
  const depths = <usize>source.depths
  let high = <i32>medium.cells
  const all = load<f64>(depths + (high << 3))
  const caught = source.caught
  const u = 2 * Random.uniform()
  const depth = u < 1 ? -Math.log1p(-u * caught) : (u - 1) * all
  const favour = 2 / (1 + (caught * Math.exp(depth)) / all)
  let cell = 0
  while (high - cell > 1) {
    // Without a branch, for none could be foretold.
    const middle = (cell + high) >> 1
    const deeper = load<f64>(depths + (middle << 3)) <= depth
    cell = select(middle, cell, deeper)
    high = select(high, middle, deeper)
  }
  const before = load<f64>(depths + (cell << 3))
  let share = (depth - before) / (load<f64>(depths + (cell << 3), 8) - before)
  if (share > 1) share = 1
  const inner = load<f64>(radii + (cell << 3))
  const asymmetry = medium.laws === 1 ? load<f64>(<usize>medium.asymmetry) : drawAsymmetry(medium, cell)
  const v = Random.uniform()
  startCell = cell
  startRadius = inner + share * (load<f64>(radii + (cell << 3), 8) - inner)
  startMu = inline.always(sampleHenyeyGreenstein(asymmetry, v))
  startWeight = source.power * favour * changetype<Cell>(CELLS + cell * CELL).albedo
}

function startFromOutside(medium: Medium, source: Source, n: i32): void {
  if (lattice < 0) lattice = Random.uniform()
  const radii = <usize>medium.radii
  const cells = <i32>medium.cells
  const outer = load<f64>(radii + (cells << 3))
  const closest = load<f64>(radii, 8)
  const u = lattice + <f64>n * GOLDEN
  const b = impactParameter(outer, closest, u - floor(u))
  const sine = b / outer
  startCell = cells - 1
  startRadius = outer
  startMu = -sqrt(1 - sine * sine)
  startWeight = source.power * impactWeight(outer, closest, b)
}

/** By the cosine law. */
function startFromSphere(medium: Medium, source: Source): void {
  const radii = <usize>medium.radii
  const last = <i32>medium.cells - 1
  let cell = 0
  while (load<f64>(radii + (cell << 3), 8) <= source.radius && cell < last) cell++
  startCell = cell
  startRadius = source.radius
  startMu = sqrt(Random.uniform())
  startWeight = source.power
}

/** Evenly in the volume of a cell, in every direction. */
function startFromDust(medium: Medium, source: Source): void {
  const cell = sampleBin(<usize>source.cumulative, <usize>source.guide, source.guideSize, Random.uniform())
  const inner = load<f64>(<usize>medium.radii + (cell << 3))
  const outer = load<f64>(<usize>medium.radii + (cell << 3), 8)
  const inner3 = inner * inner * inner
  startCell = cell
  startRadius = Math.cbrt(inner3 + Random.uniform() * (outer * outer * outer - inner3))
  startMu = 2 * Random.uniform() - 1
  startWeight = source.power
}
