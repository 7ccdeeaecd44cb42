import { wavelengthLabel } from '../output/wavelength-label.js'
import { packetsNeeded } from './packets-needed.js'
import { percent } from './percent.js'
import { missed } from './precision.js'
import type { RunResult } from './run-result.js'

/** Dust that survives higher temperatures is unknown; silicates go at about 1500 K, carbon at about 2000 K (common practice). */
const TOO_HOT = 1500

/** Dust that may sublimate counts as too hot beyond this much of its temperature: cells just inside are averages. */
const SLACK = 1.05
/** Share of a source's light above which what is missing, ambient light behind it or light outside the field, is worth a word. */
const NOTICED = 0.01
/** Share of the mass that may sublimate without a word. */
const LITTLE = 1e-3

/** What the user should know about a result before trusting it. */
export function resultWarnings(result: RunResult): string[] {
  const { model, dust } = result
  return [
    ...model.components.flatMap(({ spec }, c) => {
      const hottest = maxOf(dust.temperature, c * model.cells, (c + 1) * model.cells)
      return hottest > (spec.sublimation === undefined ? TOO_HOT : SLACK * spec.sublimation)
        ? [
            `dust ${spec.name}: reaches ${hottest.toFixed(0)} K; solid grains hardly survive above 1500 K (silicates) to 2000 K (carbon)`
          ]
        : []
    }),
    ...sublimated(result),
    ...unsettledRadii(result),
    ...cutByEdges(result),
    ...seenAgainstLight(result),
    ...emptyCells(result),
    ...precisionWarnings(result),
    ...tooFew(result)
  ]
}

function sublimated({ model, sublimation }: RunResult): string[] {
  const lost = model.components.flatMap(({ spec, mass, massBefore }) => {
    const share = 1 - mass / massBefore
    if (spec.sublimation === undefined || share < LITTLE) return []
    const depth = spec.amount.kind === 'optical-depth' ? ' and its optical depth' : ''
    return [
      `dust ${spec.name}: ${percent(share)} of its mass would be hotter than ${spec.sublimation} K and is gone; its amount${depth} in the scene counts that in`
    ]
  })
  if (sublimation?.gone.includes(1) && model.components.some(({ spec }) => spec.shape.sought))
    lost.push('sublimation: dust went after inner radii were found from temperatures; see what the inner edges have now')
  return sublimation && !sublimation.settled
    ? [...lost, `sublimation: dust was still too hot after ${sublimation.steps} steps`]
    : lost
}

/** Observers that look at the source against ambient light which it takes away noticeably. */
function seenAgainstLight({ images, spectra }: RunResult): string[] {
  const products = [
    ...images.map(({ camera, ...planes }) => ({ what: `camera ${camera.name}`, where: 'extension', of: camera, ...planes })),
    ...spectra.map(({ spectrum, ...planes }) => ({ what: `spectrum ${spectrum.name}`, where: 'column', of: spectrum, ...planes }))
  ]
  return products.flatMap(({ what, where, of: { wavelengths }, total, deficit }) => {
    if (!deficit) return []
    const shares = wavelengths.map((_, k) => planeSum(deficit, wavelengths.length, k) / planeSum(total, wavelengths.length, k))
    const many = shares.filter((share) => share > NOTICED).length
    if (many === 0) return []
    const most = largest(shares)
    return [
      `${what}: ambient light that the source takes out of its background is more than ${percent(NOTICED)} of its own light at ${many} of ${wavelengths.length} wavelengths (${Number(shares[most].toPrecision(2))} times its light at ${wavelengthLabel(wavelengths[most])}); it is not subtracted: see the ${where} ${where === 'column' ? 'deficit' : 'DEFICIT'}`
    ]
  })
}

/** Cameras that more of the light misses than their images are precise. */
function cutByEdges({ model, images }: RunResult): string[] {
  const noticed = Math.max(NOTICED, model.scene.effort.precision ?? 0)
  return images.flatMap(({ camera: { name, wavelengths }, total, beyond }) => {
    const shares = wavelengths.map((_, k) =>
      beyond[k] > 0 ? beyond[k] / (beyond[k] + planeSum(total, wavelengths.length, k)) : 0
    )
    const worst = largest(shares)
    return shares[worst] > noticed
      ? [
          `camera ${name}: about ${percent(shares[worst])} of the light at ${wavelengthLabel(wavelengths[worst])} comes from outside its field`
        ]
      : []
  })
}

/** Sum of the values at wavelength number `k` of `count`. */
function planeSum(values: Float64Array, count: number, k: number): number {
  const size = values.length / count
  return values.subarray(k * size, (k + 1) * size).reduce((a, b) => a + b, 0)
}

/** Where the largest value stands; those that are no numbers do not count. */
function largest(values: number[]): number {
  return values.reduce((best, value, k) => (value > values[best] ? k : best), 0)
}

function unsettledRadii({ model, innerRadii }: RunResult): string[] {
  if (!innerRadii || innerRadii.settled) return []
  return innerRadii.found.map(
    ({ component, sigma }) =>
      `dust ${model.components[component].spec.name}: its inner radius is known to ${percent(sigma)} only (1 sigma) with the packets of effort.equilibrium`
  )
}

function emptyCells({ model, dust }: RunResult): string[] {
  return model.components.flatMap(({ spec, density }, c) => {
    if (spec.temperature !== 'solve') return []
    const empty = density.filter((value, i) => value > 0 && Number.isNaN(dust.sigma[c * model.cells + i])).length
    return empty > 0 ? [`dust ${spec.name}: no packet came to ${empty} cells; their temperature comes from their neighbours`] : []
  })
}

function precisionWarnings(result: RunResult): string[] {
  const asked = result.model.scene.effort.precision
  const all = missed(result)
  const observers = [...new Set(all.map(({ at }) => at))]
  return observers.map((at) => {
    const worst = all.filter((miss) => miss.at === at).reduce((a, b) => (b.error > a.error ? b : a))
    const count = all.filter((miss) => miss.at === at).length
    const cause = worst.error === at.samplingError[worst.k] ? 'placing the rays' : 'photon noise'
    const place = wavelengthLabel(at.wavelengths[worst.k])
    return `${at.kind} ${at.name}: the precision of ${percent(asked!)} was not reached at ${count} of ${at.wavelengths.length} wavelengths (${cause}: ${percent(worst.error)} at ${place})`
  })
}

/** Where the packets did not suffice, and how many would. */
function tooFew(result: RunResult): string[] {
  const { effort } = result.model.scene
  const needed = packetsNeeded(result)
  const last = result.equilibrium?.rounds.at(-1)
  const about = (packets: number) => `about ${Number(packets.toPrecision(2)).toExponential().replace('e+', 'e')}`
  return [
    ...(needed.equilibrium && last
      ? [
          `dust temperatures: ${effort.equilibrium} packets were too few for ${percent(effort.precision!)} (1 sigma in what is seen ${percent(last.worst)}, last change ${percent(last.change)}); it would take ${about(needed.equilibrium)}: effort.equilibrium`
        ]
      : []),
    ...(needed.cameras
      ? [
          `scattered light: ${effort.cameras} packets were too few for ${percent(effort.precision!)}; it would take ${about(needed.cameras)} at the wavelength that needs most: effort.cameras`
        ]
      : [])
  ]
}

function maxOf(values: Float64Array, from: number, to: number): number {
  return values.subarray(from, to).reduce((most, value) => Math.max(most, value), 0)
}
