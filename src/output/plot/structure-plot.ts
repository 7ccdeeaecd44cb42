import { mapPlot } from './map-plot.js'
import { planesPlot } from './planes-plot.js'
import { radialPlot } from './radial-plot.js'
import type { DustStructure } from './structure.js'

/**
 * The picture (PNG) of the dust: temperature and density of each component against radius, or their maps in the plane of
 * cylindrical radius R (logarithmic) and height over radius z/R, or in the planes x-z and x-y; `edges`: maps with the edges of the cells.
 */
export async function structurePlot(structure: DustStructure, title: string, edges = false): Promise<Uint8Array> {
  if (structure.kind === 'radial') return radialPlot(structure, title)
  return structure.kind === 'map' ? mapPlot(structure, title, edges) : planesPlot(structure, title, edges)
}
