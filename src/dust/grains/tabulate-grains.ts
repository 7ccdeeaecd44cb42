import type { GrainPopulation } from '../../scene/types.js'
import { type GrainOptics, grainOptics, type OpticsRow, opticsOfRows } from './grain-optics.js'
import { makeGrain } from './make-grain.js'
import { mixByMass } from './mix-by-mass.js'
import { wavelengthNodes } from './wavelength-nodes.js'

/** Largest error of log-log interpolation at the middle of an interval that is left: a quarter of it once that middle is a row. */
const TOLERANCE = 0.01
/** Opacities below this share of the extinction need not be known as well. */
const MINOR = 1e-3
/** Neighbouring rows are not nearer than this in ln(wavelength), nor more than so many in all. */
const NEAREST = 5e-4
const MOST_ROWS = 1500

/** What is to be tabulated. */
export interface GrainTableRequest {
  populations: GrainPopulation[]
  /** Wavelengths to cover, cm. */
  shortest: number
  longest: number
  /** Scattering angles of the matrix, rad; none: no matrix. */
  angles: Float64Array
}

/** Optics of the mixture of all kinds at some wavelengths (cm), with its matrix at some angles (rad). */
export function mixtureOptics(populations: GrainPopulation[], wavelengths: ArrayLike<number>, angles: Float64Array): GrainOptics {
  const cosines = angles.map(Math.cos)
  // Fractions written with few digits may miss 1 by a little.
  const total = populations.reduce((sum, { massFraction }) => sum + massFraction, 0)
  return mixByMass(
    populations.map((population) => ({
      optics: grainOptics(makeGrain(population), wavelengths, cosines),
      share: population.massFraction / total
    }))
  )
}

/**
 * A table of the optics of grains whose rows suffice for interpolation: asks for the optics at lists of wavelengths until no interval
 * bends by more than TOLERANCE in its middle. Whoever drives it may let threads share a list; the table is the same.
 */
export function* grainTable({
  populations,
  shortest,
  longest
}: GrainTableRequest): Generator<number[], GrainOptics, GrainOptics> {
  const materials = populations.map(makeGrain).flatMap(({ material, coat }) => (coat ? [material, coat.material] : [material]))
  const rows = new Map<number, OpticsRow>()
  const add = (optics: GrainOptics) => {
    optics.wavelengths.forEach((wavelength, w) => {
      rows.set(wavelength, { optics, w })
    })
  }
  const nodes = wavelengthNodes(materials, shortest, longest)
  add(yield nodes)
  let open = nodes.slice(1).map((to, i) => intervalOf(nodes[i], to))
  while (open.length > 0 && rows.size + open.length <= MOST_ROWS) {
    add(yield open.map(({ middle }) => middle))
    open = open
      .filter(({ from, middle, to }) => bends(rows.get(from)!, rows.get(middle)!, rows.get(to)!))
      .flatMap(({ from, middle, to }) => [intervalOf(from, middle), intervalOf(middle, to)])
      .filter(({ from, middle }) => Math.log(middle / from) > NEAREST)
  }
  return opticsOfRows([...rows].sort(([a], [b]) => a - b).map(([, row]) => row))
}

/** The table, made on the present thread. */
export function tabulateGrains(request: GrainTableRequest): GrainOptics {
  const steps = grainTable(request)
  let step = steps.next()
  while (!step.done) step = steps.next(mixtureOptics(request.populations, step.value, request.angles))
  return step.value
}

function intervalOf(from: number, to: number) {
  return { from, middle: Math.sqrt(from * to), to }
}

/** Whether interpolation between two rows misses the one in their middle. */
function bends(left: OpticsRow, middle: OpticsRow, right: OpticsRow): boolean {
  const extinction = middle.optics.absorption[middle.w] + middle.optics.scattering[middle.w]
  const misses = (name: 'absorption' | 'scattering') => {
    const [a, b, c] = [left, middle, right].map(({ optics, w }) => optics[name][w])
    return Math.abs(Math.sqrt(a * c) - b) > TOLERANCE * (b + MINOR * extinction)
  }
  const [a, b, c] = [left, middle, right].map(({ optics, w }) => optics.asymmetry[w])
  return misses('absorption') || misses('scattering') || Math.abs(0.5 * (a + c) - b) > TOLERANCE
}
