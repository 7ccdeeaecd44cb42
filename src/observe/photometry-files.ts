import type { TopLevelSpec } from 'vega-lite'
import { rasterize } from '../output/draw/rasterize.js'
import { ecsv } from '../output/ecsv.js'
import { fluxAxis } from '../output/plot/flux-axis.js'
import { logAxis, nearFrame } from '../output/plot/log-axis.js'
import { vegaSvg } from '../output/plot/vega-svg.js'
import { wrapped } from '../output/plot/wrapped.js'
import { version } from '../output/version.js'
import { JANSKY, LIGHT_SPEED } from '../units/constants.js'
import type { Observed } from './observe-run.js'
import { photometryUnit } from './unit.js'

const um = (wavelength: number) => Number((wavelength * 1e4).toPrecision(15))

/**
 * The ECSV file of all fluxes: in Jy, so that one column holds them all; `value` is the flux in the unit of its observation.
 */
export function photometryEcsv({ fluxes, run }: Observed): string {
  const rows = fluxes.map(({ photometry }) => photometry)
  const inJy = (value: (row: (typeof rows)[number]) => number) => rows.map((row) => value(row) / JANSKY)
  const converted = rows.map(({ spec, wavelength, observed }) => {
    const unit = photometryUnit(spec.unit, spec.zeroMagnitude)
    return unit.fromCgs(observed, { frequencyHz: LIGHT_SPEED / wavelength })
  })
  return ecsv(
    [
      { name: 'name', description: 'of the observation', values: rows.map(({ spec }) => spec.name) },
      { name: 'spectrum', description: 'of the run', values: rows.map(({ spec }) => spec.spectrum) },
      { name: 'wavelength', unit: 'um', description: 'pivot of a band', values: rows.map(({ wavelength }) => um(wavelength)) },
      { name: 'flux', unit: 'Jy', description: 'observed', values: inJy(({ observed }) => observed) },
      {
        name: 'sigma',
        unit: 'Jy',
        description: '1 sigma of the Monte Carlo part of the run',
        values: inJy(({ sigma }) => sigma)
      },
      { name: 'noise', unit: 'Jy', description: '1 sigma of the noise of the instrument', values: inJy(({ noise }) => noise) },
      { name: 'expected', unit: 'Jy', description: 'without noise', values: inJy(({ expected }) => expected) },
      { name: 'value', description: 'observed, in the unit beside it', values: converted },
      {
        name: 'unit',
        description: 'of value',
        values: rows.map(({ spec }) => (spec.zeroMagnitude && spec.unit === 'mag' ? 'mag' : photometryUnit(spec.unit).fits))
      }
    ],
    { origin: `motelight ${version}`, title: run.record.title }
  )
}

/** The plot (PNG) of the fluxes measured of one spectrum of the run, over that spectrum. */
export async function photometryPlot({ fluxes, run }: Observed, spectrum: string): Promise<Uint8Array> {
  const rows = fluxes.filter(({ source }) => source.name === spectrum)
  const { source } = rows[0]
  const line = source.wavelengths.map((wavelength, k) => ({ wavelength: um(wavelength), flux: source.total[k] / JANSKY }))
  const points = rows.map(({ photometry: { wavelength, observed, noise, sigma } }) => ({
    wavelength: um(wavelength),
    flux: observed / JANSKY,
    error: Math.hypot(noise, sigma) / JANSKY
  }))
  const y = fluxAxis(
    'Jy',
    [...line, ...points].map(({ flux }) => flux)
  )
  const x = {
    field: 'wavelength',
    type: 'quantitative',
    ...logAxis(
      'wavelength (µm)',
      line.map(({ wavelength }) => wavelength)
    )
  } as const
  const flux = { field: 'flux', type: 'quantitative', ...y } as const
  const shown = (value: number) => Number.isFinite(value) && value > 0
  const bars = points
    .map(({ wavelength, flux: mean, error }) => ({
      wavelength,
      low: nearFrame(y, mean - error),
      high: nearFrame(y, mean + error)
    }))
    .filter(({ low, high }) => shown(low) && shown(high))
  const spec: TopLevelSpec = {
    title: {
      text: wrapped(run.record.title, 46),
      subtitle: wrapped(`spectrum ${spectrum} of the run, and fluxes as observed, with 1 sigma`, 85)
    },
    width: 640,
    height: 420,
    layer: [
      {
        data: { values: line.filter((row) => shown(row.flux)) },
        mark: { type: 'line', color: '#9aa5b1', clip: true },
        encoding: { x, y: flux }
      },
      {
        data: { values: bars },
        mark: { type: 'rule', color: '#222', clip: true },
        encoding: { x, y: { ...flux, field: 'low' }, y2: { field: 'high' } }
      },
      {
        data: { values: points.filter((row) => shown(row.flux)) },
        mark: { type: 'point', filled: true, size: 42, opacity: 1, color: '#c8402f', clip: true },
        encoding: { x, y: flux }
      }
    ]
  }
  return rasterize(await vegaSvg(spec), 1.5).asPng()
}
