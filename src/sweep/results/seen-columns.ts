import type { Verdict } from '../../compare/verdict.js'
import type { ObservationFinding } from '../../observe/observation-record.js'
import { COUNTS } from '../../observe/unit.js'
import type { TableColumn } from '../../output/table-column.js'
import { fluxUnit } from '../../units/flux.js'
import { intensityUnit } from '../../units/intensity.js'
import { orNaN } from '../folder/model-result.js'
import type { Sweep } from '../types.js'
import type { Judged } from './outcomes.js'

/** Chi-squared of each data set and what was fitted; NaN for a model that was not compared. */
export function verdictColumns({ data }: Sweep, { verdicts }: Judged, models: number[]): TableColumn[] {
  const column = (name: string, description: string, of: (verdict: Verdict) => number | null, unit?: string) =>
    numberColumn(
      name,
      description,
      unit,
      models.map((model) => verdicts.get(model)).map((one) => one && of(one))
    )
  const [first] = verdicts.values()
  return [
    ...(data?.content.data ?? []).map(({ name, file }, i) => {
      const values = first ? `, ${first.sets[i].values} values` : ''
      return column(`chi2_${name}`, `chi-squared of ${file}${values}`, ({ sets }) => sets[i].chiSquared)
    }),
    ...(first?.scalings ?? []).flatMap(({ scaling, unit, sets }, i, all) => {
      const several = all.filter((other) => other.scaling === scaling).length > 1
      const name = ['fitted', scaling, ...(several ? sets : [])].join('_')
      const which = `${scaling} fitted to ${sets.join(', ')}`
      return [
        column(name, which, ({ scalings }) => scalings[i].value, unit),
        column(`${name}_sigma`, `1 sigma of ${which}`, ({ scalings }) => scalings[i].sigma, unit)
      ]
    })
  ]
}

/** What the instrument records of each model, with 1 sigma of the Monte Carlo part; NaN for a model that was not observed. */
export function observationColumns({ results }: Judged, models: number[]): TableColumn[] {
  const observed = models.map((model) => results.get(model)?.seen?.observations)
  const first = observed.find((one) => one !== undefined) ?? []
  return first.flatMap(({ name, kind, ...finding }, i) => {
    const column = (ending: string, description: string, of: (finding: ObservationFinding) => number | undefined, unit: string) =>
      numberColumn(
        `observed_${name}_${ending}`,
        description,
        unit,
        observed.map((one) => one && of(one[i]))
      )
    if (kind === 'visibilities')
      return [column('flux', 'flux of the field', (one) => ('fluxJy' in one ? one.fluxJy : undefined), 'Jy')]
    const unit = 'unit' in finding ? finding.unit : ''
    if (kind === 'photometry') {
      const { fits } = fluxUnit(unit)
      return [
        column('flux', 'flux, noise of the instrument included', (one) => ('value' in one ? one.value : undefined), fits),
        column('sigma', '1 sigma of the Monte Carlo part', (one) => ('value' in one ? one.valueSigma : undefined), fits)
      ]
    }
    const fits = unit === COUNTS ? 'count' : intensityUnit(unit).fits
    return [
      column('flux', 'flux of the picture without noise', (one) => ('peak' in one ? one.pictureJy : undefined), 'Jy'),
      column('peak', 'brightest pixel', (one) => ('peak' in one ? one.peak : undefined), fits),
      column('peak_sigma', '1 sigma of the brightest pixel', (one) => ('peak' in one ? one.peakSigma : undefined), fits)
    ]
  })
}

function numberColumn(
  name: string,
  description: string,
  unit: string | undefined,
  values: (number | null | undefined)[]
): TableColumn {
  return { name, ...(unit && { unit }), description, kind: 'number', values: values.map(orNaN) }
}
