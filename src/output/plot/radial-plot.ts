import type { TopLevelSpec } from 'vega-lite'
import { AU } from '../../units/constants.js'
import { rasterize } from '../draw/rasterize.js'
import { logAxis, nearFrame } from './log-axis.js'
import type { RadialComponent, RadialStructure } from './structure.js'
import { vegaSvg } from './vega-svg.js'
import { wrapped } from './wrapped.js'

const pngZoom = 1.5
const mostDecadesOfDensity = 15
const palette = ['#0072b2', '#d55e00', '#009e73', '#cc79a7', '#e69f00', '#56b4e9', '#222222']

/** Temperature with its 1 sigma band above density, both against radius (au) with logarithmic axes; one line a component. */
export async function radialPlot({ r, components }: RadialStructure, title: string): Promise<Uint8Array> {
  const radius = Array.from(r, (value) => value / AU)
  const rows = components.flatMap((component) => radius.map((au, i) => row(component, au, i)))
  const x = { field: 'au', type: 'quantitative', ...logAxis('radius (au)', radius) } as const
  const names = components.map(({ name }) => name)
  const color = {
    field: 'name',
    type: 'nominal',
    title: 'dust',
    scale: { domain: names, range: names.map((_, i) => palette[i % palette.length]) }
  } as const
  const emitting = rows.filter(({ temperature }) => temperature > 0)
  const temperature = logAxis(
    'temperature (K)',
    emitting.flatMap(({ low, high }) => [low, high])
  )
  const density = logAxis(
    'density (g/cm³)',
    rows.map(({ density }) => density),
    mostDecadesOfDensity
  )
  const dusty = rows.filter((row) => row.density > 0)
  const size = { width: 640, height: 280 }
  const spec: TopLevelSpec = {
    title: { text: wrapped(title, 46), subtitle: emitting.some(({ low, high }) => low < high) ? 'bands: 1 sigma' : [] },
    vconcat: [
      {
        ...size,
        data: { values: emitting },
        layer: [
          {
            mark: { type: 'area', opacity: 0.3, clip: true },
            encoding: { x, color, y: { field: 'low', type: 'quantitative', ...temperature }, y2: { field: 'high' } }
          },
          {
            mark: { type: 'line', clip: true, point: { size: 10 } },
            encoding: { x, color, y: { field: 'temperature', type: 'quantitative', ...temperature } }
          }
        ]
      },
      {
        ...size,
        data: { values: dusty.map((row) => ({ ...row, density: nearFrame(density, row.density) })) },
        mark: { type: 'line', clip: true, point: { size: 10 } },
        encoding: { x, color, y: { field: 'density', type: 'quantitative', ...density } }
      }
    ]
  }
  return rasterize(await vegaSvg(spec), pngZoom).asPng()
}

/** One cell of a component; temperature 0 where it has none. */
function row({ name, density, temperature, sigma }: RadialComponent, au: number, i: number) {
  const kelvin = density[i] > 0 ? (temperature?.[i] ?? 0) : 0
  const error = sigma?.[i] ?? 0
  return {
    name,
    au,
    density: density[i],
    temperature: kelvin,
    low: Math.max(kelvin - error, 0.01 * kelvin),
    high: kelvin + error
  }
}
