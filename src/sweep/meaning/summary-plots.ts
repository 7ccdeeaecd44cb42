import type { TopLevelSpec } from 'vega-lite'
import { extent } from '../../math/stats.js'
import { vegaSvg } from '../../output/plot/vega-svg.js'
import type { Sweep } from '../types.js'
import type { Summary } from './summary.js'

/** Deviances above this are of no interest. */
const HIGHEST = 25

/** Scale of a parameter: the range of its values, or part of it. */
function axisScale(log: boolean, domain?: [number, number]) {
  const own = { nice: false, ...(domain && { domain }) }
  return log ? { type: 'log' as const, ...own } : { type: 'linear' as const, zero: false, ...own }
}

/** Numbers of six digits, with an exponent only where they would be longer. */
const numberAxis = { format: '.6~g' }

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
          axis: numberAxis,
          scale: axisScale(log, shownRange(profile))
        })
  }
  // Between the models the curve may lie below the best of them.
  const least = (profile.curve ?? []).reduce((low, row) => Math.min(low, row.deviance), 0)
  const deviance = {
    field: 'deviance',
    type: 'quantitative' as const,
    title: '−2 ln (L / L best)',
    scale: { domain: [least, HIGHEST], nice: false }
  }
  const size = { width: 330, height: 220 }
  const seen = (rows: { deviance: number }[]) => ({ values: rows.filter((row) => row.deviance <= HIGHEST) })
  const upper: TopLevelSpec = {
    ...size,
    layer: [
      {
        data: seen([{ deviance: least + 1 }, { deviance: least + 4 }]),
        mark: { type: 'rule', color: '#999', strokeDash: [4, 3] },
        encoding: { y: deviance }
      },
      { data: seen(profile.curve ?? []), mark: { type: 'line', color: '#9fc8e6', clip: true }, encoding: { x, y: deviance } },
      {
        data: seen(profile.points),
        mark: { type: 'point', filled: true, color: '#0072b2', clip: true },
        encoding: { x, y: deviance }
      }
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
          clip: true,
          color: '#9fc8e6',
          line: { color: '#0072b2' },
          interpolate: sweep.design === 'grid' ? 'linear' : 'step'
        },
        encoding: { x, y: { field: 'density', type: 'quantitative', title: 'probability density', axis: numberAxis } }
      },
      {
        data: { values: [marginal.low, marginal.middle, marginal.high].map((value) => ({ value })) },
        mark: { type: 'rule', color: '#c8402f', strokeDash: [4, 3], clip: true },
        encoding: { x }
      }
    ]
  }
  return vegaSvg({ hconcat: [upper, lower] } as TopLevelSpec)
}

/** Where the profile is of interest; undefined where that is no range. */
function shownRange({ points, curve }: ParameterSummary['profile']): [number, number] | undefined {
  const values = (curve ?? points).filter(({ deviance }) => deviance <= HIGHEST).map(({ value }) => Number(value))
  const [least, most] = extent(values)
  return least < most ? [least, most] : undefined
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
            axis: numberAxis,
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
