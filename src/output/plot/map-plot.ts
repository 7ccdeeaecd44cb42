import { Canvas } from '../draw/canvas.js'
import { inferno, viridis } from '../draw/colours.js'
import { drawing, fitted, text } from '../draw/svg.js'
import { mapPanel, panel } from './map-panel.js'
import { meridianView } from './meridian.js'
import type { MeridionalComponent, MeridionalStructure } from './structure.js'

const margin = 16
const headHeight = 70
const footHeight = 30
const decadesOfDensity = 10
/** What maps of the dust leave out. */
export function mapNote(edges: boolean): string {
  const cells = edges ? '; lines: edges of the cells, as far as these are three pixels wide' : ''
  return `white: no dust, or less than 10⁻¹⁰ of the densest${cells}`
}

const titleStyle = { size: 17, anchor: 'start', bold: true } as const
const nameStyle = { size: 14, bold: true } as const

/**
 * Maps (PNG) of density, above, and temperature, below, of cells symmetric about z, one column a component, against
 * cylindrical radius R (logarithmic) and z/R, so that the inner rim and the outer edge are seen at once. White: no dust,
 * or less than 1e-10 of the densest.
 */
export function mapPlot(structure: MeridionalStructure, title: string, edges: boolean): Uint8Array {
  const columnWidth = panel.leftRoom + panel.width + panel.rightRoom
  const canvas = new Canvas(columnWidth * structure.components.length + margin, headHeight + 2 * panel.pitch + footHeight)
  const columns = structure.components.flatMap((component, i) =>
    column(canvas, structure, component, edges, i * columnWidth + panel.leftRoom)
  )
  canvas.overlay(
    drawing(canvas.width, canvas.height, [
      text(margin, 28, fitted(title, canvas.width - 2 * margin, titleStyle), titleStyle),
      ...columns,
      text(margin, canvas.height - margin, mapNote(edges), { size: 12, anchor: 'start', fill: '#555' })
    ])
  )
  return canvas.encode()
}

/** What is shown of a component, by cell: NaN where there is no dust, or hardly any, and for the temperature of what does not emit. */
export function shownDust({ density, temperature }: MeridionalComponent): { density: Float64Array; temperature: Float64Array } {
  const least = density.reduce((a, b) => Math.max(a, b), 0) / 10 ** decadesOfDensity
  const kept = (values: Float64Array | undefined): Float64Array =>
    density.map((here, cell) => (values && here > least ? values[cell] : Number.NaN))
  return { density: kept(density), temperature: kept(temperature) }
}

function column(
  canvas: Canvas,
  structure: MeridionalStructure,
  component: MeridionalComponent,
  edges: boolean,
  left: number
): string[] {
  const { name } = component
  const { density, temperature } = shownDust(component)
  const view = meridianView(structure, (cell) => density[cell] > 0)
  const densities = { values: density, map: viridis, title: 'density (g/cm³)', edges }
  const temperatures = { values: temperature, map: inferno, title: 'temperature (K)', edges }
  return [
    text(left + panel.width / 2, headHeight - 12, fitted(name, panel.width, nameStyle), nameStyle),
    ...mapPanel(canvas, structure, view, densities, [left, headHeight]),
    ...mapPanel(canvas, structure, view, temperatures, [left, headHeight + panel.pitch])
  ]
}
