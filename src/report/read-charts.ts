import { ecsvNumbers, readEcsv } from '../data/ecsv.js'
import { readFits, unitNamed } from '../data/fits/read.js'
import { tableColumn } from '../data/fits/table.js'
import { LIGHT_SPEED } from '../units/constants.js'
import { fluxUnit, fluxUnits } from '../units/flux.js'
import { reportUnits } from './report-units.js'
import type { ChartData } from './types.js'

const gaps = (values: ArrayLike<number>): (number | null)[] =>
  Array.from(values, (value) => (Number.isFinite(value) ? value : null))

/** The chart of a spectrum, from its ECSV file. Throws a DataError. */
export function readSpectrumChart(path: string, file: string, title: string): ChartData {
  const table = readEcsv(path)
  const x = Array.from(ecsvNumbers(table, 'wavelength'))
  const column = (name: string) => gaps(ecsvNumbers(table, name))
  const parts = ['direct', 'emitted', 'scattered', 'deficit'].filter((name) => table.columns.has(name))
  return {
    title,
    file,
    x: wavelengthAxis(x),
    y: { label: 'flux', units: unitsAt(table.columns.get('flux')?.unit ?? '', x) },
    series: [
      { name: 'total', values: column('flux'), sigma: column('sigma'), look: 'line' },
      ...parts.map((name) => ({ name, values: column(name), look: 'line' as const }))
    ],
    log: { x: true, y: true }
  }
}

/** The chart of the fluxes that were measured, from the table of them all. Throws a DataError. */
export function readPhotometryChart(path: string, file: string): ChartData {
  const table = readEcsv(path)
  const [wavelength, flux, sigma, noise, expected] = ['wavelength', 'flux', 'sigma', 'noise', 'expected'].map((name) =>
    ecsvNumbers(table, name)
  )
  const sorted = sorterBy(wavelength)
  const x = sorted(wavelength)
  return {
    title: 'Fluxes',
    file,
    x: wavelengthAxis(x),
    y: { label: 'flux', units: unitsAt('Jy', x) },
    series: [
      {
        name: 'observed',
        values: gaps(sorted(flux)),
        sigma: gaps(sorted(noise.map((value, i) => Math.hypot(value, sigma[i])))),
        look: 'points'
      },
      { name: 'expected', values: gaps(sorted(expected)), look: 'points' }
    ],
    log: { x: true, y: true }
  }
}

/** Data with their model, against wavelength, baseline or the axis of a profile, from the table of a comparison. Throws a DataError. */
export function readModelChart(path: string, file: string, title: string): ChartData {
  const table = readEcsv(path)
  const names = [...table.columns.keys()]
  const column = (name: string) => ecsvNumbers(table, name)
  const [axis] = names.filter((name) => name !== 'name')
  const baselines = axis === 'east'
  const spectral = axis === 'wavelength'
  const along = baselines ? column('east').map((east, i) => Math.hypot(east, column('north')[i])) : column(axis)
  const sorted = sorterBy(along)
  const x = sorted(along)
  const limit = names.includes('limit') ? sorted(column('limit')) : x.map(() => 0)
  const parts = names.includes('data') ? [''] : ['_re', '_im']
  const unit = table.columns.get(`data${parts[0]}`)?.unit ?? ''
  const series = parts.flatMap((end): ChartData['series'] => {
    const of = end === '' ? '' : end === '_re' ? ', real part' : ', imaginary part'
    const [data, sigma, model, modelSigma] = ['data', 'sigma', 'model', 'model_sigma'].map((name) =>
      gaps(sorted(column(`${name}${end}`)))
    )
    return [
      { name: `data${of}`, values: data.map((value, i) => (limit[i] ? null : value)), sigma, look: 'points' },
      ...(limit.includes(1)
        ? [{ name: 'upper limits', values: data.map((value, i) => (limit[i] ? value : null)), sigma, look: 'points' as const }]
        : []),
      { name: `model${of}`, values: model, sigma: modelSigma, look: 'points' }
    ]
  })
  return {
    title,
    file,
    x: spectral
      ? wavelengthAxis(x)
      : { label: baselines ? 'projected baseline' : axis, unit: table.columns.get(axis)?.unit ?? '', values: x },
    // Magnitudes may count from a zero point of their own: they are not converted.
    y: {
      label: spectral ? 'flux' : !baselines ? 'intensity' : parts.length > 1 ? 'visibility' : 'amplitude',
      units: spectral && !unit.startsWith('mag') ? unitsAt(unit, x) : reportUnits(unit, [], x)
    },
    series,
    log: { x: spectral, y: spectral }
  }
}

/** The azimuthal mean of a visibility against baseline. Throws a DataError. */
export function readVisibilityChart(path: string, file: string, title: string): ChartData {
  const table = readEcsv(path)
  const [first, ...others] = [...table.columns.keys()]
  const unit = table.columns.get(others[0])?.unit ?? ''
  const values = others.filter((name) => table.columns.get(name)?.unit === unit)
  return {
    title,
    file,
    x: { label: first, unit: table.columns.get(first)?.unit ?? '', values: Array.from(ecsvNumbers(table, first)) },
    y: { label: 'amplitude', units: [{ name: unit, kind: 'linear', cgs: [] }] },
    series: values.map((name) => ({ name, values: gaps(ecsvNumbers(table, name)), look: 'line' })),
    log: { x: false, y: false }
  }
}

/** Temperature and density against radius where cells depend on it alone, from the table of cells; otherwise none. Throws a DataError. */
export function readStructureCharts(path: string, file: string): ChartData[] {
  const table = unitNamed(readFits(path), 'CELLS')
  const column = (name: string) => tableColumn(table, name).values
  const names = Array.from({ length: table.header.number('TFIELDS') ?? 0 }, (_, i) => table.header.text(`TTYPE${i + 1}`) ?? '')
  // Cubes of an octree have no radius of their own.
  if (!names.includes('r')) return []
  const r = column('r')
  const theta = column('theta')
  const components = names.filter((name) => name.startsWith('density_')).map((name) => name.slice('density_'.length))
  const densities = components.map((name) => column(`density_${name}`))
  const rows = Array.from(r.keys()).filter((i) => densities.some((density) => density[i] > 0))
  if (rows.length === 0 || new Set(rows.map((i) => r[i])).size < rows.length || new Set(rows.map((i) => theta[i])).size > 1)
    return []
  const x = { label: 'radius', unit: 'au', values: rows.map((i) => r[i]) }
  const positive = (name: string) => {
    const values = column(name)
    return rows.map((i) => (values[i] > 0 ? values[i] : null))
  }
  const warm = components.filter((name) => positive(`temperature_${name}`).some((value) => value !== null))
  const chart = (label: string, unit: string, series: ChartData['series']): ChartData => ({
    title: label,
    file,
    x,
    y: { label, units: [{ name: unit, kind: 'linear', cgs: [] }] },
    series,
    log: { x: true, y: true }
  })
  const temperature = warm.map((name) => ({
    name,
    values: positive(`temperature_${name}`),
    sigma: positive(`sigma_temperature_${name}`),
    look: 'line' as const
  }))
  const density = components.map((name) => ({ name, values: positive(`density_${name}`), look: 'line' as const }))
  return [...(warm.length > 0 ? [chart('temperature', 'K', temperature)] : []), chart('density', 'g/cm3', density)]
}

/** Puts values in the order of growing others. */
function sorterBy(others: ArrayLike<number>): (values: ArrayLike<number>) => number[] {
  const order = Array.from({ length: others.length }, (_, i) => i).sort((a, b) => others[a] - others[b])
  return (values) => order.map((i) => values[i])
}

function wavelengthAxis(values: number[]): ChartData['x'] {
  return { label: 'wavelength', unit: 'µm', values }
}

function unitsAt(fits: string, wavelengthsUm: number[]) {
  const contexts = wavelengthsUm.map((um) => ({ frequencyHz: LIGHT_SPEED / (um * 1e-4) }))
  return reportUnits(fits, fluxUnits.map(fluxUnit), contexts)
}
