import { unitText } from '../draw/numbers.js'
import { linearTicks } from '../draw/ticks.js'
import { logAxis, marks, type PlotAxis } from './log-axis.js'

const mostDecades = 8

/** The axis of a plot of fluxes: logarithmic, or magnitudes with the brightest at the top. Other than finite values are left out. */
export function fluxAxis(unit: string, values: number[]): PlotAxis {
  const title = `${fluxName(unit)} (${unitText(unit)})`
  if (unit !== 'mag') return logAxis(title, values, mostDecades)
  const finite = values.filter(Number.isFinite)
  const bright = finite.length > 0 ? Math.min(...finite) : 0
  const faint = Math.min(finite.length > 0 ? Math.max(...finite) : 1, bright + 2.5 * mostDecades)
  const room = Math.max(0.05 * (faint - bright), 0.1)
  const domain: [number, number] = [bright - room, faint + room]
  return {
    scale: { type: 'linear', domain, nice: false, zero: false, reverse: true },
    axis: { title, ...marks(linearTicks(domain[0], domain[1], 8).major), grid: true }
  }
}

/** The quantity that a flux unit measures: per frequency, per wavelength, or times the frequency. */
function fluxName(unit: string): string {
  if (unit === 'mag') return 'AB magnitude'
  if (unit.endsWith('/um') || unit.endsWith('/angstrom')) return 'flux density Fλ'
  return unit.endsWith('Jy') || unit.endsWith('/Hz') ? 'flux density Fν' : 'flux νFν'
}
