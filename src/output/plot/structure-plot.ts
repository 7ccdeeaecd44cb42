import { mapPlot } from './map-plot.js'
import { radialPlot } from './radial-plot.js'
import type { DustStructure } from './structure.js'

/**
 * The picture (PNG) of the dust: temperature and density of each component against radius, or their maps in the plane of
 * cylindrical radius R (logarithmic) and height over radius z/R.
 */
export async function structurePlot(structure: DustStructure, title: string): Promise<Uint8Array> {
  return structure.kind === 'radial' ? radialPlot(structure, title) : mapPlot(structure, title)
}
