import type { TopLevelSpec } from 'vega-lite'
import { fontFamily } from '../draw/rasterize.js'

/** Draws a Vega-Lite specification as an SVG; the same specification gives the same bytes. */
export async function vegaSvg(spec: TopLevelSpec): Promise<string> {
  // Large packages, which few files need.
  const [vega, { compile }] = await Promise.all([import('vega'), import('vega-lite')])
  vega.resetSVGDefIds()
  const view = new vega.View(vega.parse(compile({ ...spec, config: { ...look, ...spec.config } }).spec), { renderer: 'none' })
  try {
    return await view.toSVG()
  } finally {
    view.finalize()
  }
}

const look: TopLevelSpec['config'] = {
  background: 'white',
  padding: 16,
  font: fontFamily,
  title: { fontSize: 17, subtitleFontSize: 13, anchor: 'start', frame: 'group', offset: 14, subtitlePadding: 5 },
  axis: { labelFontSize: 12, titleFontSize: 13, titleFontWeight: 'normal', gridColor: '#e4e4e4', titlePadding: 8 },
  legend: { labelFontSize: 12, titleFontSize: 13, labelLimit: 0, symbolStrokeWidth: 2, symbolOpacity: 1 },
  view: { stroke: '#222' }
}
