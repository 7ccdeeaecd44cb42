import { logTicks } from '../draw/ticks.js'

/** A Vega-Lite axis: ends and kind of the scale, and marks with their labels. */
export interface PlotAxis {
  scale: { type: 'log' | 'linear'; domain: [number, number]; nice: false; zero?: false; reverse: boolean }
  axis: { title: string; values: number[]; labelExpr: string; grid: boolean }
}

/** Least ratio of the ends of an axis. */
const narrowest = 1.3

/** A logarithmic axis that holds the positive ones of `values` with some room, over at most `mostDecades` below the largest. */
export function logAxis(title: string, values: number[], mostDecades = Number.POSITIVE_INFINITY): PlotAxis {
  const positive = values.filter((value) => value > 0 && Number.isFinite(value))
  if (positive.length === 0) positive.push(0.1, 10)
  const high = positive.reduce((a, b) => Math.max(a, b))
  const low = Math.max(
    positive.reduce((a, b) => Math.min(a, b), high),
    high / 10 ** mostDecades
  )
  const room = Math.max((high / low) ** 0.05, Math.sqrt((narrowest * low) / high))
  const domain: [number, number] = [low / room, high * room]
  return {
    scale: { type: 'log', domain, nice: false, reverse: false },
    axis: { title, ...marks(logTicks(domain[0], domain[1]).major), grid: true }
  }
}

/** Room beyond the frame, as a share of its height, in which values far beyond it are put. */
const beyond = 0.03

/**
 * A value where it stands, or just beyond the frame when it lies farther out: what is drawn stays on the sheet, as the
 * renderer demands of clipped marks.
 */
export function nearFrame({ scale: { type, domain } }: PlotAxis, value: number): number {
  const [low, high] = domain
  const room = type === 'log' ? (high / low) ** beyond : beyond * (high - low)
  const [least, most] = type === 'log' ? [low / room, high * room] : [low - room, high + room]
  return Math.min(most, Math.max(least, value))
}

/** Positions and the expression that gives their labels. */
export function marks(major: { value: number; label: string }[]): { values: number[]; labelExpr: string } {
  const labels = Object.fromEntries(major.map(({ value, label }) => [String(value), label]))
  return { values: major.map(({ value }) => value), labelExpr: `${JSON.stringify(labels)}[datum.value]` }
}
