import type { TopLevelSpec } from 'vega-lite'
import { vegaSvg } from '../../output/plot/vega-svg.js'
import type { Outcomes } from '../results/sweep-table.js'
import type { Sweep } from '../types.js'
import type { Summary } from './summary.js'

/** Deviances above this are of no interest. */
const HIGHEST = 25

/** Scale of a parameter: the range of its values. */
function axisScale(log: boolean) {
  return log ? { type: 'log' as const, nice: false } : { type: 'linear' as const, zero: false, nice: false }
}

type ParameterSummary = Summary['parameters'][number]

/** Profile of the likelihood of a parameter, with the lines of 68 % and 95 %, and its marginal probability where there is one. */
export function parameterPlot(sweep: Sweep, { name, unit, profile, marginal }: ParameterSummary): Promise<string> {
  const log = sweep.parameters.find((parameter) => parameter.name === name)!.log
  const text = profile.points.some(({ value }) => typeof value === 'string')
  const title = unit ? `${name} (${unit})` : name
  const x = {
    field: 'value',
    title,
    ...(text
      ? { type: 'nominal' as const }
      : {
          type: 'quantitative' as const,
          axis: { format: '~g' },
          scale: axisScale(log)
        })
  }
  const deviance = {
    field: 'deviance',
    type: 'quantitative' as const,
    title: '−2 ln (L / L best)',
    scale: { domain: [0, HIGHEST], nice: false }
  }
  const size = { width: 330, height: 220 }
  const seen = (rows: { deviance: number }[]) => ({ values: rows.filter((row) => row.deviance <= HIGHEST) })
  const upper: TopLevelSpec = {
    ...size,
    layer: [
      {
        data: seen([{ deviance: 1 }, { deviance: 4 }]),
        mark: { type: 'rule', color: '#999', strokeDash: [4, 3] },
        encoding: { y: deviance }
      },
      { data: seen(profile.curve ?? []), mark: { type: 'line', color: '#9fc8e6' }, encoding: { x, y: deviance } },
      { data: seen(profile.points), mark: { type: 'point', filled: true, color: '#0072b2' }, encoding: { x, y: deviance } }
    ]
  }
  if (!marginal) return vegaSvg(upper)
  const lower: TopLevelSpec = {
    ...size,
    layer: [
      {
        data: { values: marginal.curve },
        mark: {
          type: 'area',
          color: '#9fc8e6',
          line: { color: '#0072b2' },
          interpolate: sweep.design === 'grid' ? 'linear' : 'step'
        },
        encoding: { x, y: { field: 'density', type: 'quantitative', title: 'probability density', axis: { format: '~g' } } }
      },
      {
        data: { values: [marginal.low, marginal.middle, marginal.high].map((value) => ({ value })) },
        mark: { type: 'rule', color: '#c8402f', strokeDash: [4, 3] },
        encoding: { x }
      }
    ]
  }
  return vegaSvg({ hconcat: [upper, lower] } as TopLevelSpec)
}

/** Labels of values on a grid. */
const pairAxis = {
  labelAngle: -40,
  labelExpr: "isNumber(datum.value) ? format(datum.value, '.4~g') : datum.value",
  labelOverlap: true
} as const

/** The least deviance over the plane of two parameters. */
export function pairPlot(sweep: Sweep, { names, points }: Summary['pairs'][number]): Promise<string> {
  const [x, y] = names.map((name, i) => {
    const { unit, kind, log } = sweep.parameters.find((parameter) => parameter.name === name)!
    const title = unit ? `${name} (${unit})` : name
    const gridded = sweep.design === 'grid' || kind === 'text'
    return {
      field: i === 0 ? 'a' : 'b',
      title,
      ...(gridded
        ? { type: 'ordinal' as const, sort: (i === 0 ? 'ascending' : 'descending') as 'ascending' | 'descending', axis: pairAxis }
        : {
            type: 'quantitative' as const,
            axis: { format: '~g' },
            scale: axisScale(log)
          })
    }
  })
  const values = points.map(({ values: [a, b], deviance }) => ({ a, b, deviance: Math.min(deviance, HIGHEST) }))
  return vegaSvg({
    width: 330,
    height: 330,
    data: { values },
    mark: sweep.design === 'grid' ? { type: 'rect' } : { type: 'circle', size: 60, opacity: 1 },
    encoding: {
      x,
      y,
      color: {
        field: 'deviance',
        type: 'quantitative',
        title: '−2 ln (L / L best)',
        legend: { titleLimit: 0 },
        scale: { scheme: 'viridis', domain: [0, HIGHEST], reverse: true }
      }
    }
  } as TopLevelSpec)
}

/** The fluxes of the best model and the data, with 1 sigma of both. */
export function dataPlot(sweep: Sweep, { results }: Outcomes, model: number): Promise<string> {
  const rows = sweep.data.flatMap(({ name, spectrum, wavelengths, fluxJy, sigmaJy }) => {
    const fit = results.get(model)!.spectra.find((one) => one.name === spectrum)!
    const own = fit.wavelengthUm.map((wavelength, k) => ({
      what: `model ${model}`,
      wavelength,
      flux: fit.flux[k],
      low: fit.flux[k] - fit.sigma[k],
      high: fit.flux[k] + fit.sigma[k]
    }))
    const data = wavelengths.map((wavelength, i) => ({
      what: name,
      wavelength: wavelength * 1e4,
      flux: fluxJy[i],
      low: fluxJy[i] - sigmaJy[i],
      high: fluxJy[i] + sigmaJy[i]
    }))
    return [...own, ...data]
  })
  const shown = rows.filter(({ flux }) => flux > 0)
  const [least, most] = [
    shown.reduce((a, { flux }) => Math.min(a, flux), Number.POSITIVE_INFINITY) / 2,
    2 * shown.reduce((a, { flux }) => Math.max(a, flux), 0)
  ]
  const scale = { type: 'log' as const, nice: false }
  const y = (field: string) => ({
    field,
    type: 'quantitative' as const,
    title: 'flux density (Jy)',
    axis: { format: '~g' },
    scale: { ...scale, domain: [least, most] }
  })
  const x = { field: 'wavelength', type: 'quantitative' as const, title: 'wavelength (µm)', scale: { ...scale, padding: 12 } }
  const color = {
    field: 'what',
    type: 'nominal' as const,
    title: null,
    scale: { range: ['#222222', '#c8402f', '#0072b2', '#e69f00', '#009e73'] }
  }
  const isModel = { filter: `datum.what === 'model ${model}'` }
  const within = (value: number) => Math.min(most, Math.max(least, value))
  return vegaSvg({
    width: 640,
    height: 320,
    data: { values: shown.map((row) => ({ ...row, low: within(row.low), high: within(row.high) })) },
    layer: [
      { transform: [isModel], mark: { type: 'line', strokeWidth: 1 }, encoding: { x, y: y('flux'), color } },
      { mark: { type: 'rule' }, encoding: { x, y: y('low'), y2: { field: 'high' }, color } },
      {
        mark: { type: 'point', filled: true, size: 40 },
        encoding: { x, y: y('flux'), color, shape: { field: 'what', title: null } }
      }
    ]
  } as TopLevelSpec)
}
