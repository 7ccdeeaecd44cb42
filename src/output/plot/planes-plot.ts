import { AU } from '../../units/constants.js'
import { axis } from '../draw/axis.js'
import { Canvas } from '../draw/canvas.js'
import { inferno, viridis } from '../draw/colours.js'
import { drawing, fitted, text } from '../draw/svg.js'
import { linearTicks } from '../draw/ticks.js'
import { paintMap } from './map-panel.js'
import { mapNote, shownDust } from './map-plot.js'
import type { PlaneComponent, PlaneStructure } from './structure.js'

const room = { left: 86, right: 130, below: 62, head: 70, foot: 30, margin: 16 }
const titleStyle = { size: 17, anchor: 'start', bold: true } as const
const nameStyle = { size: 14, bold: true } as const

/** Maps (PNG) of density, above, and temperature, below, of every component in each plane, side by side. White as in `mapPlot`. */
export function planesPlot({ components, pixels }: PlaneStructure, title: string, edges: boolean): Uint8Array {
  const columnWidth = room.left + pixels + room.right
  const rowHeight = pixels + room.below
  const columns = components.flatMap((component) => component.planes.map((plane) => ({ component, plane })))
  const canvas = new Canvas(columnWidth * columns.length + room.margin, room.head + 2 * rowHeight + room.foot)
  const maps = columns.flatMap(({ component, plane }, i) => {
    const left = i * columnWidth + room.left
    const name = `${component.name}, plane ${plane.axes.join('-')}`
    const { density, temperature } = inPlanes(component, shownDust(component))
    const contents = [
      { values: density, map: viridis, title: 'density (g/cm³)' },
      { values: temperature, map: inferno, title: 'temperature (K)' }
    ]
    return [
      text(left + pixels / 2, room.head - 12, fitted(name, pixels, nameStyle), nameStyle),
      ...contents.flatMap((content, row) => {
        const top = room.head + row * rowHeight
        return [
          ...paintMap(canvas, plane.cells, { ...content, edges }, { left, top, width: pixels, height: pixels }),
          ...lengths(component.half / AU, plane.axes, pixels, left, top)
        ]
      })
    ]
  })
  canvas.overlay(
    drawing(canvas.width, canvas.height, [
      text(room.margin, 28, fitted(title, canvas.width - 2 * room.margin, titleStyle), titleStyle),
      ...maps,
      text(room.margin, canvas.height - room.margin, mapNote(edges), { size: 12, anchor: 'start', fill: '#555' })
    ])
  )
  return canvas.encode()
}

/** Values of the cells that show in one of the planes, for colours of which none is left to others; NaN elsewhere. */
function inPlanes(
  { planes }: PlaneComponent,
  { density, temperature }: ReturnType<typeof shownDust>
): ReturnType<typeof shownDust> {
  const shows = new Uint8Array(density.length)
  for (const { cells } of planes) for (const cell of cells) if (cell >= 0) shows[cell] = 1
  const kept = (values: Float64Array) => values.map((value, cell) => (shows[cell] === 1 ? value : Number.NaN))
  return { density: kept(density), temperature: kept(temperature) }
}

function lengths(half: number, [across, up]: [string, string], pixels: number, left: number, top: number): string[] {
  const ticks = linearTicks(-half, half, 6)
  const position = (au: number) => (pixels * (1 + au / half)) / 2
  return [
    ...axis({
      side: 'bottom',
      at: top + pixels,
      middle: left + pixels / 2,
      position: (au) => left + position(au),
      ticks,
      title: `${across} (au)`
    }),
    ...axis({
      side: 'left',
      at: left,
      middle: top + pixels / 2,
      position: (au) => top + pixels - position(au),
      ticks,
      title: `${up} (au)`
    })
  ]
}
