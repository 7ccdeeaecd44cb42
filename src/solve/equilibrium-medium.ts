import { binOpacity } from '../dust/binned-opacity.js'
import { coolingOf, type EmissionTable, makeEmissionTable, rowOf } from '../dust/emission.js'
import { transportWavelengths, type WavelengthGrid } from '../dust/wavelength-grid.js'
import { reachOf } from '../grid/cells.js'
import { allocateShared } from '../math/allocate.js'
import { makeSamplingTable } from '../math/cdf.js'
import type { Model } from '../model/model.js'
import { inflow } from '../sources/ambient.js'
import { powerBins } from '../sources/power-bins.js'
import type { EquilibriumMedium, EquilibriumSource } from '../transport/equilibrium-medium.js'
import { binnedLaws } from './binned-laws.js'
import { type CentralLight, centralLight } from './central-light.js'

/** The medium of the temperature phase with what its solution needs on the main thread. */
export interface EquilibriumSetup {
  medium: EquilibriumMedium
  grid: WavelengthGrid
  tables: EmissionTable[]
  /** What the packets of all sources carry together, erg/s. */
  luminosity: number
  /** Starlight that needs no packets on its way to where it meets dust. */
  central?: CentralLight
  /** Luminosity of the stars in each bin, erg/s. */
  starlight: Float64Array
  /** What ambient fields send into the outer sphere in each bin, erg/s. */
  ambient: Float64Array
}

/** Least share of the packets of the field, and of all other sources. */
const LEAST_SHARE = 0.2

const shared = (length: number) => new Float64Array(allocateShared(8 * length))

/** Lays out a model for the temperature phase. Dust of fixed temperature is a source; dust without emission absorbs for good. */
export function equilibriumSetup(model: Model): EquilibriumSetup {
  const { components, stars, fields, cells, volume, walls } = model
  const ranges = [...stars, ...fields].map(({ spectrum }) => spectrum.range)
  const grid = transportWavelengths(
    Math.min(...ranges.map(([shortest]) => shortest), Number.POSITIVE_INFINITY),
    Math.max(...ranges.map(([, longest]) => longest), 0),
    components.flatMap(({ law }) => law.kinks)
  )
  const bins = grid.count
  const density = shared(components.length * cells)
  const absorption = shared(components.length * bins)
  const extinction = shared(components.length * bins)
  const asymmetry = shared(components.length * bins)
  const emissionRow = shared(components.length * cells)
  const tables = components.map(({ law, density: rho }, c) => {
    const opacity = binOpacity(law, grid)
    density.set(rho, c * cells)
    absorption.set(opacity.absorption, c * bins)
    asymmetry.set(opacity.asymmetry, c * bins)
    for (let k = 0; k < bins; k++) extinction[c * bins + k] = opacity.absorption[k] + opacity.scattering[k]
    return makeEmissionTable(opacity.absorption, grid, allocateShared)
  })
  const starlight = new Float64Array(bins)
  const powers: number[] = []
  const sources: EquilibriumSource[] = []
  const inMiddle = new Float64Array(bins)
  for (const { spec, spectrum } of stars) {
    const light = powerBins(spectrum, grid)
    const central = spec.extent === 'point' && model.dimensions < 3
    light.forEach((value, k) => {
      starlight[k] += value
      if (central) inMiddle[k] += value
    })
    if (central) continue
    powers.push(spectrum.luminosity)
    const radius = spec.extent === 'sphere' ? spec.radius! : 0
    sources.push({ kind: 'star', at: spec.at, radius, bins: makeSamplingTable(light, 1, bins, allocateShared) })
  }
  const central = model.dimensions < 3 ? centralLight(model, { bins, density, absorption, extinction }, inMiddle) : undefined
  if (central && central.caught > 0) {
    powers.push(central.caught)
    sources.push(central.source)
  }
  const outer = reachOf(walls)
  const ambient = new Float64Array(bins)
  for (const { spectrum } of fields) {
    powerBins(inflow(spectrum, outer), grid).forEach((value, k) => {
      ambient[k] += value
    })
  }
  if (fields.length > 0) {
    powers.push(ambient.reduce((sum, value) => sum + value, 0))
    sources.push({ kind: 'ambient', bins: makeSamplingTable(ambient, 1, bins, allocateShared) })
  }
  components.forEach(({ spec, density: rho }, component) => {
    if (spec.temperature === 'solve') return
    emissionRow.fill(-1, component * cells, (component + 1) * cells)
    if (spec.temperature === 'none') return
    const cooling = 4 * Math.PI * coolingOf(tables[component], spec.temperature)
    const emitted = rho.map((value, cell) => value * volume[cell] * cooling)
    powers.push(emitted.reduce((sum, value) => sum + value, 0))
    sources.push({
      kind: 'dust',
      component,
      cells: makeSamplingTable(emitted, 1, cells, allocateShared),
      row: Math.min(rowOf(tables[component], spec.temperature), tables[component].rows - 1.001)
    })
  })
  const luminosity = powers.reduce((sum, value) => sum + value, 0)
  const shares = packetShares(
    Float64Array.from(powers, (power) => power / luminosity),
    sources.findIndex(({ kind }) => kind === 'ambient')
  )
  return {
    medium: {
      walls,
      cells,
      components: components.length,
      bins,
      density,
      absorption,
      extinction,
      asymmetry,
      ...binnedLaws(components, grid),
      emission: tables.map(({ sampling }) => sampling),
      emissionRow,
      walk: { first: new Int32Array(allocateShared(4 * (cells + 1))), levels: new Float64Array() },
      planck: shared(components.length * cells),
      sources,
      sourceTable: makeSamplingTable(shares, 1, powers.length),
      sourceEnergy: shares.map((share, i) => powers[i] / luminosity / share)
    },
    grid,
    tables,
    luminosity,
    ...(central && { central }),
    starlight,
    ambient
  }
}

/**
 * Shares of the packets: those of the power, but at least LEAST_SHARE for the ambient field and as much for all other sources, so
 * that each heats well what the other does not reach. `field`: index of the field's share, -1 for none.
 */
function packetShares(powers: Float64Array, field: number): Float64Array {
  if (field < 0 || powers.length === 1) return powers
  const share = Math.min(1 - LEAST_SHARE, Math.max(LEAST_SHARE, powers[field]))
  const others = 1 - powers[field]
  return powers.map((power, i) => (i === field ? share : ((1 - share) * power) / others))
}
