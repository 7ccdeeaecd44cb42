import type { TopLevelSpec } from 'vega-lite'
import type { ApertureSpectrum } from '../../camera/types.js'
import type { Scene } from '../../scene/types.js'
import { ARCSECOND } from '../../units/angles.js'
import { PARSEC } from '../../units/constants.js'
import { shortNumber } from '../draw/numbers.js'
import { rasterize } from '../draw/rasterize.js'
import { inDegrees } from '../in-degrees.js'
import { spectrumInUnit } from '../spectrum-in-unit.js'
import { fluxAxis } from './flux-axis.js'
import { logAxis, nearFrame } from './log-axis.js'
import { vegaSvg } from './vega-svg.js'
import { wrapped } from './wrapped.js'

const pngZoom = 1.5
const colours = { total: '#222222', direct: '#e69f00', emitted: '#c8402f', scattered: '#0072b2' }
const parts = Object.keys(colours) as (keyof typeof colours)[]

/**
 * The plot of a spectrum, as SVG and PNG: flux in the spectrum's unit against wavelength (um), both logarithmic; the total
 * with 1 sigma error bars and its direct, emitted and scattered parts.
 */
export async function spectrumPlot(spectrum: ApertureSpectrum, scene: Scene): Promise<{ svg: string; png: Uint8Array }> {
  const svg = await vegaSvg(specification(spectrum, scene))
  return { svg, png: rasterize(svg, pngZoom).asPng() }
}

function specification(measured: ApertureSpectrum, scene: Scene): TopLevelSpec {
  const { spectrum: spec } = measured
  const values = spectrumInUnit(measured)
  const y = fluxAxis(spec.unit, [...values.total, ...values.direct, ...values.emitted, ...values.scattered])
  const shown = (value: number): boolean => Number.isFinite(value) && (y.scale.type === 'linear' || value > 0)
  const rows = parts.flatMap((part) =>
    values.wavelengthUm
      .map((wavelength, k) => ({ wavelength, part, flux: values[part][k] }))
      .filter(({ flux }) => shown(flux))
      .map((row) => ({ ...row, flux: nearFrame(y, row.flux) }))
  )
  const bars = values.wavelengthUm
    .map((wavelength, k) => ({
      wavelength,
      low: nearFrame(y, values.total[k] - values.sigma[k]),
      high: nearFrame(y, values.total[k] + values.sigma[k])
    }))
    .filter(({ low, high }) => shown(low) && shown(high))
  const x = { field: 'wavelength', type: 'quantitative', ...logAxis('wavelength (µm)', values.wavelengthUm) } as const
  const dark = { color: colours.total, clip: true }
  const end = (field: 'low' | 'high') => ({
    data: { values: bars },
    mark: { type: 'tick', orient: 'horizontal', size: 6, thickness: 1, ...dark } as const,
    encoding: { x, y: { field, type: 'quantitative', ...y } as const }
  })
  return {
    title: { text: wrapped(scene.title, 46), subtitle: wrapped(caption(measured, scene, rows.length === 0), 85) },
    width: 640,
    height: 420,
    layer: [
      {
        data: { values: rows },
        mark: { type: 'line', clip: true, point: { size: 14 }, strokeWidth: 1.6 },
        encoding: {
          x,
          y: { field: 'flux', type: 'quantitative', ...y },
          color: { field: 'part', type: 'nominal', title: null, scale: { domain: parts, range: Object.values(colours) } }
        }
      },
      {
        data: { values: bars },
        mark: { type: 'rule', ...dark },
        encoding: { x, y: { field: 'low', type: 'quantitative', ...y }, y2: { field: 'high' } }
      },
      end('low'),
      end('high')
    ]
  }
}

function caption({ spectrum: { name, view, aperture } }: ApertureSpectrum, scene: Scene, empty: boolean): string {
  const circle = Number.isFinite(aperture) ? `aperture radius ${shortNumber(aperture / ARCSECOND)} arcsec` : 'all of the source'
  const parts = [
    `spectrum ${name}`,
    `inclination ${shortNumber(inDegrees(view.inclination))}°, azimuth ${shortNumber(inDegrees(view.azimuth))}°`,
    circle,
    `${shortNumber(scene.distance / PARSEC)} pc`
  ]
  return `${parts.join(' · ')}${empty ? ' · no light in this spectrum' : ''}`
}
