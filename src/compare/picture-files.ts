import { redBlue } from '../output/draw/colours.js'
import { linearTicks } from '../output/draw/ticks.js'
import { card, commentCard, realCard } from '../output/fits/card.js'
import { joined } from '../output/fits/hdu.js'
import { imageHdu } from '../output/fits/image.js'
import { originCards } from '../output/fits/origin-cards.js'
import { wavelengthTableHdu } from '../output/fits/wcs.js'
import { panelSize } from '../output/png/panel-size.js'
import { skyPicture } from '../output/png/sky-picture.js'
import { spacedWavelength, wavelengthLabel } from '../output/wavelength-label.js'
import { ARCSECOND, DEGREE } from '../units/angles.js'
import { residual, type Values } from './goodness.js'
import { type ModelPoint, modelPlot } from './model-plot.js'
import { profileOf, rings, sectors } from './profile.js'
import type { ComparedSet, Placement, ShownPicture } from './sets/compared-set.js'
import type { PictureData } from './types.js'

const wcsKeywords = ['CTYPE', 'CUNIT', 'CRPIX', 'CRVAL', 'CDELT'].flatMap((name) => [`${name}1`, `${name}2`])
const matrixKeywords = ['CD', 'PC'].flatMap((name) => ['1_1', '1_2', '2_1', '2_2'].map((end) => `${name}${end}`))
const MOST_RINGS = 30
const SECTORS = 24

/** Residuals over sigma of the pixels that are compared. */
function residualsOf({ data }: ComparedSet, model: Values): Float64Array {
  return Float64Array.from(data.values, (value, i) =>
    residual(value, model.values[i], Math.hypot(data.sigma[i], model.sigma[i]), false)
  )
}

/**
 * The FITS file of a compared picture, pixels and coordinates as in the data: residuals over sigma (primary HDU), and DATA, MODEL,
 * SIGMA (data) and MODELSIG (Monte Carlo) in the unit of the data, then the wavelength. NaN where nothing is compared.
 */
export function comparedFits(set: ComparedSet, shown: ShownPicture, model: Values, title: string): Uint8Array {
  const { width, height, pixels, inUnit, unit } = shown
  const { picture } = set.spec as PictureData
  const magnitudes = unit.startsWith('mag')
  const plane = (values: ArrayLike<number>) => {
    const whole = new Float64Array(width * height).fill(Number.NaN)
    pixels.forEach((pixel, i) => {
      whole[pixel] = values[i]
    })
    return whole
  }
  const errors = (sigma: ArrayLike<number>, mean: ArrayLike<number>) =>
    Float64Array.from(sigma, (value, i) => (magnitudes ? (2.5 / Math.LN10) * (value / mean[i]) : inUnit(value)))
  const { header } = picture.image
  const place = [...wcsKeywords, ...matrixKeywords, 'CROTA2', 'EQUINOX', 'RADESYS', 'LONPOLE'].flatMap((keyword) => {
    const value = header.number(keyword) ?? header.text(keyword)
    return value === undefined ? [] : [typeof value === 'number' ? realCard(keyword, value) : card(keyword, value)]
  })
  const parts: [string, Float64Array, string | undefined, string][] = [
    ['RESIDUAL', residualsOf(set, model), undefined, '(data - model) over the 1 sigma of both'],
    ['DATA', Float64Array.from(set.data.values, inUnit), picture.unit.fits, 'data that are compared'],
    ['MODEL', Float64Array.from(model.values, inUnit), picture.unit.fits, 'model in the pixels of the data'],
    ['SIGMA', errors(set.data.sigma, set.data.values), picture.unit.fits, '1 sigma of the data'],
    ['MODELSIG', errors(model.sigma, model.values), picture.unit.fits, '1 sigma of the Monte Carlo part of the run']
  ]
  const images = parts.map(([name, values, bunit, meaning], i) =>
    imageHdu(i === 0 ? 'primary' : 'extension', [width, height], plane(values), [
      card('EXTNAME', name),
      commentCard(`This image: ${meaning}.`),
      ...(bunit ? [card('BUNIT', bunit)] : []),
      ...place,
      ...(i === 0
        ? [...originCards({ title, distance: shown.distance }), card('COMPARED', set.spec.name, 'name of the data set')]
        : [])
    ])
  )
  return joined([...images, wavelengthTableHdu([set.wavelength!])])
}

/** The picture (PNG) of residuals over sigma, north up, about where the source is. */
export function residualPng(set: ComparedSet, shown: ShownPicture, model: Values, title: string): Uint8Array {
  const { width, height, pixels, place, distance } = shown
  const residuals = new Float64Array(width * height).fill(Number.NaN)
  const values = residualsOf(set, model)
  pixels.forEach((pixel, i) => {
    residuals[pixel] = values[i]
  })
  const side = Math.sqrt((set.spec as PictureData).picture.sky.pixelSr)
  const reach = Math.max(...Array.from(shown.east, (east, i) => Math.max(Math.abs(east), Math.abs(shown.north[i]))))
  const count = 2 * Math.ceil(reach / side + 0.5 - 1e-6)
  const seen = Float64Array.from({ length: count * count }, (_, i) => {
    const [x, y] = place((count / 2 - 0.5 - (i % count)) * side, (Math.floor(i / count) + 0.5 - count / 2) * side).map(Math.round)
    return x >= 0 && y >= 0 && x < width && y < height ? residuals[y * width + x] : Number.NaN
  })
  const light = set.wavelength === undefined ? '' : ` · ${spacedWavelength(wavelengthLabel(set.wavelength))}`
  const view = {
    width: count,
    height: count,
    field: [count * side, count * side] as [number, number],
    distance,
    title,
    subtitle: `${set.spec.name}${light} · residual over sigma: red where the data are brighter`
  }
  const most = Math.max(3, Math.min(10, Math.ceil(Math.max(...values.map(Math.abs)))))
  const fraction = (value: number) => Math.min(1, Math.max(0, 0.5 + (0.5 * value) / most))
  const beyond = values.reduce((sum, value) => sum + (Math.abs(value) > 3 ? 1 : 0), 0)
  const size = panelSize(view)
  return skyPicture(view, {
    values: seen,
    size,
    map: redBlue,
    light: true,
    colour: fraction,
    ticks: linearTicks(-most, most, 6),
    title: '(data − model) / σ',
    fraction,
    note: `${beyond} of ${values.length} pixels beyond 3 sigma; grey: not compared`
  })
}

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
  const reach = Math.max(...from.east.map((value, i) => Math.hypot(value, from.north[i])))
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
