import type { TopLevelSpec } from 'vega-lite'
import { rasterize } from '../draw/rasterize.js'
import { linearAxis } from './linear-axis.js'
import { logAxis, nearFrame, type PlotAxis } from './log-axis.js'
import { vegaSvg } from './vega-svg.js'
import { wrapped } from './wrapped.js'

const pngZoom = 1.5
const mostDecades = 8
const palette = ['#0072b2', '#d55e00', '#009e73', '#cc79a7', '#e69f00', '#56b4e9', '#222222']

/** One line of a plot; other than finite values, and on a logarithmic axis other than positive ones, are left out. */
export interface PlotLine {
  name: string
  x: ArrayLike<number>
  y: ArrayLike<number>
  dashed?: boolean
}

export interface PlotPanel {
  x: PlotAxis
  y: PlotAxis
  lines: PlotLine[]
  height: number
}

/** A plot of one or more panels below each other, as SVG and PNG; a name has the same colour in all. */
export async function linePlot(title: string, subtitle: string, panels: PlotPanel[]): Promise<{ svg: string; png: Uint8Array }> {
  const names = [...new Set(panels.flatMap(({ lines }) => lines.map(({ name }) => name)))]
  const spec: TopLevelSpec = {
    title: { text: wrapped(title, 46), subtitle: wrapped(subtitle, 85) },
    vconcat: panels.map((panel) => panelOf(panel, names)),
    resolve: { scale: { color: 'independent' } }
  }
  const svg = await vegaSvg(spec)
  return { svg, png: rasterize(svg, pngZoom).asPng() }
}

function panelOf({ x, y, lines, height }: PlotPanel, all: string[]) {
  const drawn = (value: number) => Number.isFinite(value) && (y.scale.type === 'linear' || value > 0)
  const rows = lines.flatMap(({ name, x: at, y: values, dashed = false }, line) =>
    Array.from(values, (value, i) => ({ name, line, dashed, x: at[i], y: value }))
      .filter((row) => drawn(row.y) && row.x >= x.scale.domain[0] && row.x <= x.scale.domain[1])
      .map((row) => ({ ...row, y: nearFrame(y, row.y) }))
  )
  const names = [...new Set(lines.map(({ name }) => name))]
  return {
    width: 640,
    height,
    data: { values: rows },
    mark: { type: 'line', clip: true, strokeWidth: 1.6 } as const,
    encoding: {
      x: { field: 'x', type: 'quantitative', ...x } as const,
      y: { field: 'y', type: 'quantitative', ...y } as const,
      detail: { field: 'line', type: 'nominal' } as const,
      color: {
        field: 'name',
        type: 'nominal',
        title: null,
        scale: { domain: names, range: names.map((name) => palette[all.indexOf(name) % palette.length]) }
      } as const,
      strokeDash: {
        field: 'dashed',
        type: 'nominal',
        legend: null,
        scale: {
          domain: [false, true],
          range: [
            [1, 0],
            [5, 4]
          ]
        }
      } as const
    }
  }
}

/** Axis of opacities of some lines. */
export const opacityAxis = (lines: PlotLine[]) =>
  logAxis(
    'opacity (cm²/g)',
    lines.flatMap(({ y }) => Array.from(y)),
    mostDecades
  )

/** Axis of fractions and mean cosines, with a little room. */
export const fractionAxis = (title: string, lines: PlotLine[]) => {
  const least = Math.min(0, ...lines.flatMap(({ y }) => Array.from(y)).filter(Number.isFinite))
  return linearAxis(title, [Math.floor(least * 5) / 5 - 0.05, 1.05])
}
