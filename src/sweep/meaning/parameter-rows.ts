import { tidy } from '../plan/value.js'
import type { Sweep } from '../types.js'
import type { Summary } from './summary.js'

/** For each parameter: name, best value, intervals, median. */
export function parameterRows({ parameters }: Sweep, summary: Summary): string[][] {
  const [first] = summary.best
  return summary.parameters.map(({ name, unit, profile, marginal }) => {
    const shown = (value: number) => String(tidy(Number(value.toPrecision(4))))
    const interval = (low?: number, high?: number) =>
      low === undefined || high === undefined ? '–' : `${shown(low)} to ${shown(high)}${unit && ` ${unit}`}`
    const value = first.values[parameters.findIndex((parameter) => parameter.name === name)]
    return [
      name,
      typeof value === 'number' ? `${shown(value)}${unit && ` ${unit}`}` : value,
      interval(profile.low, profile.high),
      interval(marginal?.low, marginal?.high),
      marginal ? `${shown(marginal.middle)}${unit && ` ${unit}`}` : '–'
    ]
  })
}
