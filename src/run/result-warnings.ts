import type { Model } from '../model/model.js'
import { wavelengthLabel } from '../output/wavelength-label.js'
import { percent } from './percent.js'
import { missed } from './precision.js'
import type { RunResult } from './run-scene.js'

/** Dust that survives higher temperatures is unknown; silicates go at about 1500 K, carbon at about 2000 K (common practice). */
const TOO_HOT = 1500

/** What the user should know about a result before trusting it. */
export function resultWarnings(result: RunResult): string[] {
  const { model, dust, equilibrium } = result
  return [
    ...model.components.flatMap(({ spec }, c) => {
      const hottest = maxOf(dust.temperature, c * model.cells, (c + 1) * model.cells)
      return hottest > TOO_HOT
        ? [
            `dust ${spec.name}: reaches ${hottest.toFixed(0)} K; solid grains hardly survive above 1500 K (silicates) to 2000 K (carbon)`
          ]
        : []
    }),
    ...emptyCells(result),
    ...precisionWarnings(result),
    ...(equilibrium && !equilibrium.reached ? [unsettled(model, equilibrium)] : [])
  ]
}

function emptyCells({ model, dust }: RunResult): string[] {
  return model.components.flatMap(({ spec, density }, c) => {
    if (spec.temperature !== 'solve') return []
    const empty = density.filter((value, i) => value > 0 && Number.isNaN(dust.sigma[c * model.cells + i])).length
    return empty > 0 ? [`dust ${spec.name}: no packet came to ${empty} cells; their temperature is that of their neighbours`] : []
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

function unsettled({ scene }: Model, { rounds }: NonNullable<RunResult['equilibrium']>): string {
  const last = rounds[rounds.length - 1]
  return `dust temperatures: ${scene.effort.equilibrium} packets were too few for ${percent(scene.effort.precision!)} in all that is seen (1 sigma ${percent(last.error)}, last change ${percent(last.change)}); raise effort.equilibrium`
}

function maxOf(values: Float64Array, from: number, to: number): number {
  return values.subarray(from, to).reduce((most, value) => Math.max(most, value), 0)
}
