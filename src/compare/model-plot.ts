import type { TopLevelSpec } from 'vega-lite'
import { extent } from '../math/stats.js'
import { unitText } from '../output/draw/numbers.js'
import { rasterize } from '../output/draw/rasterize.js'
import { fluxAxis } from '../output/plot/flux-axis.js'
import { linearAxis } from '../output/plot/linear-axis.js'
import { logAxis, nearFrame, type PlotAxis } from '../output/plot/log-axis.js'
import { vegaSvg } from '../output/plot/vega-svg.js'
import { wrapped } from '../output/plot/wrapped.js'
import { fluxUnits } from '../units/flux.js'

/** A value of the data and of the model, and its residual over sigma; `second` is that of a second part. */
export interface ModelPoint {
  x: number
  data: number
  sigma: number
  model: number
  residual: number
  second?: number
  limit: boolean
}

export interface ModelPanel {
  axis: { title: string; logarithmic: boolean }
  unit: string
  quantity: string
  points: ModelPoint[]
  /** The model between the points. */
  line: { x: number; y: number }[]
}

const width = 640
const [dataColour, modelColour] = ['#222', '#0072b2']
const leastResidual = 3.5
const room = 1.08

/** A plot (PNG) of data with their errors (upper limits as triangles) and the model, residuals over sigma below each panel. */
export async function modelPlot({
  title,
  subtitle,
  panels
}: {
  title: string
  subtitle: string
  panels: ModelPanel[]
}): Promise<Uint8Array> {
  const spec: TopLevelSpec = {
    title: {
      text: wrapped(title, 46),
      subtitle: wrapped(`${subtitle} · black: data with 1 sigma; blue: model`, 74)
    },
    spacing: 12,
    vconcat: panels.flatMap((panel) => [valuesPanel(panel), residualPanel(panel)])
  }
  return rasterize(await vegaSvg(spec), 1.5).asPng()
}

function axisOfX({ axis: { title, logarithmic }, points }: ModelPanel, bare: boolean) {
  const values = points.map(({ x }) => x)
  const shownTitle = bare ? '' : title
  if (logarithmic && values.every((value) => value > 0))
    return { field: 'x', type: 'quantitative', ...logAxis(shownTitle, spread(values)) } as const
  const [low, high] = extent(values)
  const margin = high > low ? 0.03 * (high - low) : 1
  return { field: 'x', type: 'quantitative', ...linearAxis(shownTitle, [low - margin, high + margin]) } as const
}

function spread(values: number[]): number[] {
  const [low, high] = extent(values)
  return [low / 1.1, ...values, high * 1.1]
}

function axisOfY({ points, unit, quantity }: ModelPanel): PlotAxis {
  const title = `${quantity} (${unitText(unit)})`
  const values = points.flatMap(({ data, model }) => [data, model]).filter(Number.isFinite)
  const [low, high] = extent(values)
  if (unit === 'mag') return fluxAxis(unit, values)
  if (low > 0 && high > 30 * low) {
    const axis = fluxUnits.includes(unit) ? fluxAxis(unit, values) : logAxis(title, values, 8)
    return { ...axis, axis: { ...axis.axis, title } }
  }
  const ends = points.flatMap(({ data, sigma, model, limit }) => (limit ? [data, model] : [data - sigma, data + sigma, model]))
  const [from, to] = extent(ends.filter(Number.isFinite))
  const margin = 0.05 * (to - from || Math.abs(to) || 1)
  const axis = linearAxis(title, [from - margin, to + margin])
  return unit.startsWith('mag') ? { ...axis, scale: { ...axis.scale, reverse: true } } : axis
}

function valuesPanel(panel: ModelPanel) {
  const x = axisOfX(panel, true)
  const y = axisOfY(panel)
  const drawn = (value: number) => Number.isFinite(value) && (y.scale.type === 'linear' || value > 0)
  const rows = panel.points.map((point) => ({
    ...point,
    low: nearFrame(y, point.data - point.sigma),
    high: nearFrame(y, point.data + point.sigma)
  }))
  const marks = (values: object[], field: 'data' | 'model', mark: object) => ({
    data: { values },
    mark: { type: 'point', opacity: 1, clip: true, ...mark } as const,
    encoding: { x, y: { field, type: 'quantitative', ...y } as const }
  })
  return {
    width,
    height: 300,
    layer: [
      {
        data: { values: panel.line.filter(({ y: value }) => drawn(value)) },
        mark: { type: 'line', color: modelColour, opacity: 0.45, clip: true } as const,
        encoding: { x, y: { field: 'y', type: 'quantitative', ...y } as const }
      },
      marks(
        panel.points.filter(({ model }) => drawn(model)),
        'model',
        { shape: 'diamond', color: modelColour, size: 40, filled: true }
      ),
      {
        data: { values: rows.filter(({ limit, low, high }) => !limit && drawn(low) && drawn(high)) },
        mark: { type: 'rule', color: dataColour, clip: true } as const,
        encoding: { x, y: { field: 'low', type: 'quantitative', ...y } as const, y2: { field: 'high' } as const }
      },
      marks(
        rows.filter(({ limit, data }) => !limit && drawn(data)),
        'data',
        { shape: 'circle', color: dataColour, size: 26, filled: true }
      ),
      marks(
        rows.filter(({ limit, data }) => limit && drawn(data)),
        'data',
        { shape: 'triangle-down', color: dataColour, size: 70, filled: false }
      )
    ]
  }
}

function residualPanel(panel: ModelPanel) {
  const x = axisOfX(panel, false)
  const residuals = panel.points
    .flatMap(({ residual, second = 0 }) => [Math.abs(residual), Math.abs(second)])
    .filter(Number.isFinite)
  const most = room * Math.max(leastResidual, ...residuals)
  const y = linearAxis('residual / σ', [-most, most], 6)
  const marks = (field: 'residual' | 'second', filled: boolean) => ({
    data: { values: panel.points.filter((point) => point[field] !== undefined) },
    mark: { type: 'point', shape: 'circle', color: dataColour, size: 26, filled, opacity: 1 } as const,
    encoding: { x, y: { field, type: 'quantitative', ...y } as const }
  })
  return {
    width,
    height: 110,
    layer: [
      {
        data: { values: [{ zero: 0 }] },
        mark: { type: 'rule', color: modelColour } as const,
        encoding: { y: { field: 'zero', type: 'quantitative', ...y } as const }
      },
      marks('residual', true),
      marks('second', false)
    ]
  }
}
