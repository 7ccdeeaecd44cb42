import type { TopLevelSpec } from 'vega-lite'
import { rasterize } from '../output/draw/rasterize.js'
import { ecsv } from '../output/ecsv.js'
import { vegaSvg } from '../output/plot/vega-svg.js'
import { wrapped } from '../output/plot/wrapped.js'
import { version } from '../output/version.js'
import { spacedWavelength, wavelengthLabel } from '../output/wavelength-label.js'
import { DEGREE } from '../units/angles.js'
import { LIGHT_SPEED } from '../units/constants.js'
import { fluxUnit } from '../units/flux.js'
import type { ComplexValues } from './fourier.js'
import type { Visibilities } from './visibilities.js'

const metres = (length: number) => Number((length / 100).toPrecision(15))

function meta({ spec, wavelength }: Visibilities, title: string) {
  return {
    origin: `motelight ${version}`,
    title,
    observation: spec.name,
    camera: spec.camera,
    wavelength_um: Number((wavelength * 1e4).toPrecision(15))
  }
}

/** How flux densities are written: in the unit of the observation. */
function inUnit({ spec, wavelength }: Visibilities): { unit: string; of: (value: number) => number } {
  const unit = fluxUnit(spec.unit)
  return { unit: unit.fits, of: (value) => unit.fromCgs(value, { frequencyHz: LIGHT_SPEED / wavelength }) }
}

/** The ECSV file of visibilities, one row a baseline: amplitude and phase, and the same without noise. */
export function visibilityEcsv(measured: Visibilities, title: string): string {
  const { spec, wavelength, observed, expected, sigma, noise } = measured
  const { unit, of } = inUnit(measured)
  const amplitude = ({ re, im }: ComplexValues) => Array.from(re, (value, i) => of(Math.hypot(value, im[i])))
  const phase = ({ re, im }: ComplexValues) => Array.from(re, (value, i) => Math.atan2(im[i], value) / DEGREE)
  const along = (axis: 0 | 1) => spec.baselines.map((baseline) => baseline[axis])
  return ecsv(
    [
      { name: 'east', unit: 'm', description: 'projected baseline', values: along(0).map(metres) },
      { name: 'north', unit: 'm', description: 'projected baseline', values: along(1).map(metres) },
      { name: 'u', description: 'east in wavelengths', values: along(0).map((length) => length / wavelength) },
      { name: 'v', description: 'north in wavelengths', values: along(1).map((length) => length / wavelength) },
      { name: 'amplitude', unit, description: 'observed', values: amplitude(observed) },
      { name: 'phase', unit: 'deg', description: 'observed; falls towards u for a source in the east', values: phase(observed) },
      {
        name: 'sigma',
        unit,
        description: '1 sigma of real and imaginary part: Monte Carlo part of the run',
        values: sigma.map(of)
      },
      {
        name: 'noise',
        unit,
        description: '1 sigma of real and imaginary part: noise of the instrument',
        values: sigma.map(() => of(noise))
      },
      { name: 'expected_amplitude', unit, description: 'without noise', values: amplitude(expected) },
      { name: 'expected_phase', unit: 'deg', description: 'without noise', values: phase(expected) }
    ],
    meta(measured, title)
  )
}

/** The ECSV file of closure phases, one row a triangle of baselines. */
export function closureEcsv(measured: Visibilities, title: string): string {
  const { closures } = measured
  const degrees = (key: 'observed' | 'expected' | 'sigma' | 'noise') => closures.map((closure) => closure[key] / DEGREE)
  const number = (i: number) => closures.map(({ baselines }) => baselines[i])
  const rows = 'row of the visibilities, counted from 1; negative where it is passed backwards'
  return ecsv(
    [
      { name: 'first', description: rows, values: number(0) },
      { name: 'second', description: rows, values: number(1) },
      { name: 'third', description: rows, values: number(2) },
      { name: 'closure_phase', unit: 'deg', description: 'observed', values: degrees('observed') },
      { name: 'sigma', unit: 'deg', description: '1 sigma: Monte Carlo part of the run', values: degrees('sigma') },
      { name: 'noise', unit: 'deg', description: '1 sigma: noise of the instrument', values: degrees('noise') },
      { name: 'expected', unit: 'deg', description: 'without noise', values: degrees('expected') }
    ],
    meta(measured, title)
  )
}

/** The ECSV file of the azimuthal mean of the visibility. */
export function curveEcsv(measured: Visibilities, title: string): string {
  const { curve, flux } = measured
  const { unit, of } = inUnit(measured)
  return ecsv(
    [
      { name: 'baseline', unit: 'm', description: 'projected length', values: curve.baseline.map(metres) },
      {
        name: 'visibility',
        unit,
        description: 'mean over all directions (real part; the imaginary part is 0)',
        values: curve.visibility.map(of)
      },
      { name: 'relative', description: 'the same relative to the flux', values: curve.visibility.map((value) => value / flux) }
    ],
    meta(measured, title)
  )
}

/** The plot (PNG) of amplitudes and of the mean visibility against the length of the baseline. */
export async function visibilityPlot(measured: Visibilities, title: string): Promise<Uint8Array> {
  const { spec, wavelength, observed, curve, noise } = measured
  const { of } = inUnit(measured)
  const line = Array.from(curve.baseline, (length, i) => ({
    baseline: metres(length),
    amplitude: Math.abs(of(curve.visibility[i]))
  }))
  const points = spec.baselines.map(([east, north], i) => {
    const amplitude = Math.hypot(observed.re[i], observed.im[i])
    return {
      baseline: metres(Math.hypot(east, north)),
      amplitude: of(amplitude),
      low: of(Math.max(0, amplitude - noise)),
      high: of(amplitude + noise)
    }
  })
  const x = { field: 'baseline', type: 'quantitative', title: 'projected baseline (m)', axis: { format: '~r' } } as const
  const y = { field: 'amplitude', type: 'quantitative', title: `amplitude (${spec.unit})` } as const
  const subtitle = `${spec.name} · ${spacedWavelength(wavelengthLabel(wavelength))} · line: mean over all directions`
  const plot: TopLevelSpec = {
    title: { text: wrapped(title, 46), subtitle: wrapped(subtitle, 85) },
    width: 640,
    height: 420,
    layer: [
      { data: { values: line }, mark: { type: 'line', color: '#9aa5b1' }, encoding: { x, y } },
      {
        data: { values: points },
        mark: { type: 'rule', color: '#222' },
        encoding: { x, y: { ...y, field: 'low' }, y2: { field: 'high' } }
      },
      {
        data: { values: points },
        mark: { type: 'point', filled: true, size: 30, opacity: 1, color: '#c8402f' },
        encoding: { x, y }
      }
    ]
  }
  return rasterize(await vegaSvg(plot), 1.5).asPng()
}
