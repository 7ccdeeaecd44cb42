import type { TableColumn } from '../../output/table-column.js'
import { fluxUnit } from '../../units/flux.js'
import { intensityUnit } from '../../units/intensity.js'
import type { ModelResult } from '../folder/model-result.js'
import type { Sweep } from '../types.js'
import type { Judged, Outcomes } from './outcomes.js'
import { observationColumns, verdictColumns } from './seen-columns.js'

/** How a model stands: `imprecise` is done, but for the precision asked for. */
export type ModelState = 'done' | 'imprecise' | 'failed' | 'unfinished'

export function stateOf(model: number, { results, failures }: Outcomes): ModelState {
  const result = results.get(model)
  if (result) return result.precise ? 'done' : 'imprecise'
  return failures.has(model) ? 'failed' : 'unfinished'
}

/** The table of a sweep, one row a model in their order; what an unfinished one has not is NaN. */
export function sweepTable(sweep: Sweep, outcomes: Judged): TableColumn[] {
  const { parameters, models } = sweep
  const { results, failures } = outcomes
  const numbers = models.map((_, i) => i + 1)
  const first = [...results.values()][0]
  const number = (name: string, description: string, of: (model: number) => number, unit?: string): TableColumn => ({
    name,
    ...(unit && { unit }),
    description,
    kind: 'number',
    values: numbers.map(of)
  })
  const lists = (name: string, description: string, of: (result: ModelResult) => number[], unit?: string): TableColumn => {
    const missing = of(first).map(() => Number.NaN)
    const values = numbers.map((model) => (results.has(model) ? of(results.get(model)!) : missing))
    return { name, ...(unit && { unit }), description, kind: 'list', values }
  }
  return [
    { name: 'model', description: 'number of the model', kind: 'integer', values: numbers },
    {
      name: 'state',
      description: 'done, imprecise, failed or unfinished',
      kind: 'text',
      values: numbers.map((model) => stateOf(model, outcomes))
    },
    ...parameters.map(({ name, unit, kind, role }, p): TableColumn => {
      const column = { name, description: role, values: models.map((values) => values[p]) }
      return kind === 'text'
        ? { ...column, kind, values: column.values.map(String) }
        : { ...column, kind, values: column.values.map(Number), ...(unit && { unit }) }
    }),
    ...verdictColumns(sweep, outcomes, numbers),
    ...observationColumns(outcomes, numbers),
    ...(first?.spectra ?? []).flatMap(({ name, unit }, s) => [
      lists(`${name}_wavelength`, 'vacuum wavelength', ({ spectra }) => spectra[s].wavelengthUm, 'um'),
      lists(`${name}_flux`, 'total in the aperture', ({ spectra }) => spectra[s].flux, fluxUnit(unit).fits),
      lists(`${name}_sigma`, '1 sigma of the Monte Carlo part', ({ spectra }) => spectra[s].sigma, fluxUnit(unit).fits)
    ]),
    ...(first?.images ?? []).flatMap(({ name, unit }, c) => [
      lists(`${name}_image_wavelength`, 'vacuum wavelength', ({ images }) => images[c].wavelengthUm, 'um'),
      lists(`${name}_image_flux`, 'flux of the whole field', ({ images }) => images[c].fluxJy, 'Jy'),
      lists(`${name}_image_peak`, 'brightest pixel', ({ images }) => images[c].peak, intensityUnit(unit).fits),
      lists(
        `${name}_image_peak_sigma`,
        '1 sigma of the brightest pixel',
        ({ images }) => images[c].peakSigma,
        intensityUnit(unit).fits
      )
    ]),
    number('packets', 'photon packets spent', (model) => results.get(model)?.packets ?? Number.NaN),
    {
      name: 'remarks',
      description: 'warnings, or why the model failed',
      kind: 'text',
      values: numbers.map((model) => results.get(model)?.warnings.join(' / ') ?? failures.get(model)?.message ?? '')
    }
  ]
}
