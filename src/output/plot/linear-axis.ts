import { linearTicks } from '../draw/ticks.js'
import { marks, type PlotAxis } from './log-axis.js'

/** A linear axis between two values, with about `count` labels. */
export function linearAxis(title: string, [low, high]: [number, number], count = 6): PlotAxis {
  return {
    scale: { type: 'linear', domain: [low, high], nice: false, zero: false, reverse: false },
    axis: { title, ...marks(linearTicks(low, high, count).major), grid: true }
  }
}
