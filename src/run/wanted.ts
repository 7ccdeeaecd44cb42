import { starsOnSky } from '../camera/stars-on-sky.js'
import { STOKES, stokesPlanes } from '../camera/stokes-planes.js'
import type { ApertureSpectrum, CameraImages, StarOnSky } from '../camera/types.js'
import { hasAmbient } from '../scene/has-ambient.js'
import { isPolarised } from '../scene/is-polarised.js'
import type { CameraSpec, Scene, SpectrumSpec } from '../scene/types.js'
import { GROUPS } from '../solve/groups.js'
import type { Estimator } from './estimator.js'

/** A camera or spectrum that wants the wavelength at hand, and the index of the wavelength in its list. */
export type Wanted =
  | { kind: 'camera'; spec: CameraSpec; images: CameraImages; k: number }
  | { kind: 'spectrum'; spec: SpectrumSpec; result: ApertureSpectrum; k: number }

const PLANES = ['total', 'sigma', 'direct', 'emitted', 'scattered'] as const

/** Values of one camera or spectrum at one wavelength. */
export type WantedValues = Record<(typeof PLANES)[number], Float64Array> &
  Partial<Record<(typeof STOKES)[number] | 'deficit', Float64Array>> & {
    /** Of pictures. */
    modes?: Int8Array
    samplingError: number
    /** Of pictures: see CameraImages. */
    beyond: number
    /** Of each star in the picture, erg/s/cm2/Hz. */
    starFlux: number[]
  }

/** Products full of zeros, and which of them want a wavelength. */
export function emptyProducts(scene: Scene, estimator: Estimator) {
  const arrays = (length: number) => ({
    total: new Float64Array(length),
    sigma: new Float64Array(length),
    direct: new Float64Array(length),
    emitted: new Float64Array(length),
    scattered: new Float64Array(length),
    // Exit bins catch intensity alone.
    ...(estimator !== 'exit' && isPolarised(scene) && { stokes: stokesPlanes(length) }),
    ...(hasAmbient(scene) && { deficit: new Float64Array(length) })
  })
  const images = scene.cameras.map((camera): CameraImages => {
    const [width, height] = camera.pixels
    const count = camera.wavelengths.length
    // Exit bins catch direct light like all other, wherever it leaves.
    const stars = estimator === 'exit' ? [] : starsOnSky(scene, camera)
    return {
      camera,
      width,
      height,
      ...arrays(width * height * count),
      modes: new Int8Array(GROUPS * width * height * count),
      stars,
      samplingError: new Array(count).fill(0),
      beyond: new Array(count).fill(0)
    }
  })
  const spectra = scene.spectra.map((spectrum): ApertureSpectrum => {
    const count = spectrum.wavelengths.length
    return { spectrum, ...arrays(count), samplingError: new Array(count).fill(0) }
  })
  const wantedAt = (wavelength: number): Wanted[] => [
    ...images.flatMap((result) =>
      indicesOf(result.camera.wavelengths, wavelength).map(
        (k): Wanted => ({ kind: 'camera', spec: result.camera, images: result, k })
      )
    ),
    ...spectra.flatMap((result) =>
      indicesOf(result.spectrum.wavelengths, wavelength).map(
        (k): Wanted => ({ kind: 'spectrum', spec: result.spectrum, result, k })
      )
    )
  ]
  return { images, spectra, wantedAt }
}

/** A copy of the values of what is wanted. */
export function valuesOf(wanted: Wanted[]): WantedValues[] {
  return wanted.map((want) => {
    const { product, from, to } = placeOf(want)
    const copies = PLANES.map((plane): [string, Float64Array] => [plane, product[plane].slice(from, to)])
    const { stokes } = product
    if (stokes) copies.push(...STOKES.map((plane): [string, Float64Array] => [plane, stokes[plane].slice(from, to)]))
    if (product.deficit) copies.push(['deficit', product.deficit.slice(from, to)])
    const starFlux = starsOf(want).map(({ flux }) => flux[want.k])
    return {
      ...Object.fromEntries(copies),
      ...(want.kind === 'camera' && { modes: want.images.modes.slice(GROUPS * from, GROUPS * to) }),
      samplingError: product.samplingError[want.k],
      beyond: want.kind === 'camera' ? want.images.beyond[want.k] : 0,
      starFlux
    } as WantedValues
  })
}

/** Puts values that `valuesOf` gave back where they came from. */
export function putValues(wanted: Wanted[], values: WantedValues[]): void {
  wanted.forEach((want, i) => {
    const { product, from } = placeOf(want)
    for (const plane of PLANES) product[plane].set(values[i][plane], from)
    if (product.stokes) for (const plane of STOKES) product.stokes[plane].set(values[i][plane]!, from)
    product.deficit?.set(values[i].deficit!, from)
    product.samplingError[want.k] = values[i].samplingError
    if (want.kind === 'camera') {
      want.images.beyond[want.k] = values[i].beyond
      want.images.modes.set(values[i].modes!, GROUPS * from)
    }
    starsOf(want).forEach(({ flux }, star) => {
      flux[want.k] = values[i].starFlux[star]
    })
  })
}

/**
 * The same picture, of one wavelength, with `plane` (width x height) in place of the total and nothing else kept: for what is made as if
 * it were light.
 */
export function inPlaceOfTotal(
  { spec, images }: Pick<Extract<Wanted, { kind: 'camera' }>, 'spec' | 'images'>,
  plane: Float64Array,
  stars: StarOnSky[]
): Extract<Wanted, { kind: 'camera' }> {
  return {
    kind: 'camera',
    spec,
    k: 0,
    images: { ...images, ...asTotal(plane), modes: new Int8Array(GROUPS * plane.length), beyond: [0], stars }
  }
}

/** As `inPlaceOfTotal`, of a spectrum; `value` has one element. */
export function inPlaceOfFlux(
  { spec, result }: Pick<Extract<Wanted, { kind: 'spectrum' }>, 'spec' | 'result'>,
  value: Float64Array
): Wanted {
  return { kind: 'spectrum', spec, k: 0, result: { ...result, ...asTotal(value) } }
}

function asTotal(total: Float64Array) {
  const none = () => new Float64Array(total.length)
  return {
    total,
    sigma: none(),
    direct: none(),
    emitted: none(),
    scattered: none(),
    deficit: undefined,
    stokes: undefined,
    samplingError: [0]
  }
}

const starsOf = (want: Wanted) => (want.kind === 'camera' ? want.images.stars : [])

function placeOf(want: Wanted) {
  const product = want.kind === 'camera' ? want.images : want.result
  const length = want.kind === 'camera' ? want.images.width * want.images.height : 1
  return { product, from: want.k * length, to: (want.k + 1) * length }
}

function indicesOf(values: number[], value: number): number[] {
  return values.flatMap((other, k) => (other === value ? [k] : []))
}
