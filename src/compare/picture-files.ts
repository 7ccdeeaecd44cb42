import { extent } from '../math/stats.js'
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
import { residual, type Values } from './goodness.js'
import type { ComparedSet, ShownPicture } from './sets/compared-set.js'
import type { PictureData } from './types.js'

const wcsKeywords = ['CTYPE', 'CUNIT', 'CRPIX', 'CRVAL', 'CDELT'].flatMap((name) => [`${name}1`, `${name}2`])
const matrixKeywords = ['CD', 'PC'].flatMap((name) => ['1_1', '1_2', '2_1', '2_2'].map((end) => `${name}${end}`))

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
  const { width, height, pixels, inUnit, sigmaInUnit } = shown
  const { picture } = set.spec as PictureData
  const plane = (values: ArrayLike<number>) => {
    const whole = new Float64Array(width * height).fill(Number.NaN)
    pixels.forEach((pixel, i) => {
      whole[pixel] = values[i]
    })
    return whole
  }
  const errors = (sigma: ArrayLike<number>, mean: ArrayLike<number>) =>
    Float64Array.from(sigma, (value, i) => sigmaInUnit(mean[i], value))
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
  const reach = extent(shown.east.map((east, i) => Math.max(Math.abs(east), Math.abs(shown.north[i]))))[1]
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
  const most = Math.max(3, Math.min(10, Math.ceil(extent(values.map(Math.abs))[1])))
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
