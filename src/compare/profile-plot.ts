import { extent } from '../math/stats.js'
import { ARCSECOND, DEGREE } from '../units/angles.js'
import type { Values } from './goodness.js'
import { type ModelPoint, modelPlot } from './model-plot.js'
import { profileOf, rings, sectors } from './profile.js'
import type { ComparedSet, Placement, ShownPicture } from './sets/compared-set.js'
import type { PictureData } from './types.js'

const MOST_RINGS = 30
const SECTORS = 24

/** The plot (PNG) of radial and azimuthal means of data and model about the fitted centre. */
export function profilePlot(
  set: ComparedSet,
  shown: ShownPicture,
  model: Values,
  { east, north }: Placement,
  title: string
): Promise<Uint8Array> {
  const { picture } = set.spec as PictureData
  const from = { east: shown.east.map((value) => value - east), north: shown.north.map((value) => value - north) }
  const side = Math.sqrt(picture.sky.pixelSr)
  const reach = extent(from.east.map((value, i) => Math.hypot(value, from.north[i])))[1]
  const count = Math.max(2, Math.min(MOST_RINGS, Math.ceil(reach / side)))
  const edges = Array.from({ length: count + 1 }, (_, i) => (i * reach * (1 + 1e-9)) / count)
  const middles = Float64Array.from({ length: count }, (_, i) => 0.5 * (edges[i] + edges[i + 1]))
  const angles = Float64Array.from({ length: SECTORS }, (_, i) => (2 * Math.PI * (i + 0.5)) / SECTORS)
  const panel = (at: Float64Array, size: number, axisTitle: string, binOf: ReturnType<typeof rings>) => {
    const data = profileOf(at, binOf, { ...from, ...set.data }, set.independent)
    const ofModel = profileOf(at, binOf, { ...from, ...model }, 0)
    const points = Array.from(at, (value, i): ModelPoint => {
      const error = Math.hypot(data.sigma[i], ofModel.sigma[i])
      const [mean, expected] = [shown.inUnit(data.mean[i]), shown.inUnit(ofModel.mean[i])]
      return {
        x: value / size,
        data: mean,
        sigma: Math.abs(shown.inUnit(data.mean[i] + data.sigma[i]) - mean),
        model: expected,
        residual: (data.mean[i] - ofModel.mean[i]) / error,
        limit: false
      }
    }).filter((_, i) => data.count[i] > 0)
    const quantity = shown.unit.startsWith('mag') ? 'surface brightness' : 'mean intensity'
    return {
      axis: { title: axisTitle, logarithmic: false },
      unit: shown.unit,
      quantity,
      points,
      line: points.map(({ x, model: y }) => ({ x, y }))
    }
  }
  return modelPlot({
    title,
    subtitle: `${set.spec.name} · means over rings, and over sectors of all that is compared`,
    panels: [
      panel(middles, ARCSECOND, 'radius (arcsec)', rings(edges)),
      panel(angles, DEGREE, 'position angle (°), from north towards east', sectors(angles, [0, reach * (1 + 1e-9)]))
    ]
  })
}
